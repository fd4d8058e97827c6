import { describe, expect, it } from 'vitest'
import type { RibbonInput, RibbonShape, RibbonSize } from '#shared/assessment/ribbon'
import { layoutRibbon } from '#shared/assessment/ribbon'

const planned: RibbonInput = {
  shift: { fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T14:00:00Z' },
  nowAt: '2026-07-03T05:00:00Z',
  spans: [],
  pauses: [],
  checks: [],
  faults: [],
  plannedEndAt: null,
  minimumAt: null,
  maximumAt: null,
}

// 8 h = 480 min, margin 2 % = 9.6 min each side, so 499.2 min; 499.2 + 4 px wide makes one pixel a minute.
const aMinuteAPixel = { width: 503.2, height: 40 }
const MARGIN = 2 + 9.6

function ofKind<Kind extends RibbonShape['kind']>(input: RibbonInput, kind: Kind, size: RibbonSize = aMinuteAPixel) {
  return layoutRibbon(input, size).shapes.filter((shape): shape is Extract<RibbonShape, { kind: Kind }> => shape.kind === kind)
}

describe('a ribbon', () => {
  it('draws a sample that has not begun as dashes over its shift', () => {
    expect(layoutRibbon(planned, aMinuteAPixel).band).toEqual({ y: 8, height: 16 })
    expect(ofKind(planned, 'shift')).toEqual([{ kind: 'shift', fromX: MARGIN, toX: MARGIN + 480, y: 16 }])
    expect(ofKind(planned, 'dashed')).toEqual([{ kind: 'dashed', x: MARGIN, y: 8, width: 480, height: 16 }])
    expect(ofKind(planned, 'solid')).toEqual([])
  })

  it('is solid where air was drawn, open where it was paused, dashed from now to the planned end', () => {
    const running: RibbonInput = {
      ...planned,
      nowAt: '2026-07-03T11:00:00Z',
      spans: [
        { fromAt: '2026-07-03T06:10:00Z', toAt: '2026-07-03T09:00:00Z', pumpId: 'a' },
        { fromAt: '2026-07-03T09:30:00Z', toAt: null, pumpId: 'a' },
      ],
      pauses: [{ fromAt: '2026-07-03T09:00:00Z', toAt: '2026-07-03T09:30:00Z', reason: 'break' }],
      plannedEndAt: '2026-07-03T13:30:00Z',
    }
    expect(ofKind(running, 'solid')).toEqual([
      { kind: 'solid', x: MARGIN + 10, y: 8, width: 170, height: 16, pumpId: 'a', notch: 0 },
      { kind: 'solid', x: MARGIN + 210, y: 8, width: 90, height: 16, pumpId: 'a', notch: 0 },
    ])
    expect(ofKind(running, 'open')).toEqual([{ kind: 'open', x: MARGIN + 180, y: 8, width: 30, height: 16, reason: 'break' }])
    expect(ofKind(running, 'dashed')).toEqual([{ kind: 'dashed', x: MARGIN + 300, y: 8, width: 150, height: 16 }])
    expect(ofKind(running, 'now')).toEqual([{ kind: 'now', x: MARGIN + 300, fromY: 4, toY: 26 }])
    expect(ofKind(running, 'seam')).toEqual([])
  })

  it('cuts the notch into the last piece once the sample is stopped, and has nothing more to come', () => {
    const stopped: RibbonInput = {
      ...planned,
      nowAt: '2026-07-05T11:00:00Z',
      spans: [{ fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T12:00:00Z' }],
    }
    expect(ofKind(stopped, 'solid')).toEqual([{ kind: 'solid', x: MARGIN, y: 8, width: 360, height: 16, pumpId: null, notch: 6 }])
    expect(ofKind(stopped, 'dashed')).toEqual([])
    const paused: RibbonInput = { ...stopped, pauses: [{ fromAt: '2026-07-03T12:00:00Z', toAt: null, reason: null }] }
    expect(ofKind(paused, 'solid')).toMatchObject([{ notch: 0 }])
    expect(ofKind(stopped, 'now')).toEqual([])
  })

  it('shows a seam where the pump was swapped', () => {
    const swapped: RibbonInput = {
      ...planned,
      spans: [
        { fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T08:00:00Z', pumpId: 'a' },
        { fromAt: '2026-07-03T08:00:00Z', toAt: '2026-07-03T10:00:00Z', pumpId: 'b' },
      ],
    }
    expect(ofKind(swapped, 'seam')).toEqual([{ kind: 'seam', x: MARGIN + 120, fromY: 8, toY: 24 }])
  })

  it('stitches checks and tears faults at their minute', () => {
    const checked: RibbonInput = {
      ...planned,
      checks: [{ at: '2026-07-03T06:15:00Z', verdict: 'within' }, { at: '2026-07-03T08:15:00Z', verdict: 'stop' }],
      faults: [{ at: '2026-07-03T08:14:00Z' }],
    }
    expect(ofKind(checked, 'stitch')).toEqual([
      { kind: 'stitch', x: MARGIN + 15, fromY: 8, toY: 24, verdict: 'within' },
      { kind: 'stitch', x: MARGIN + 135, fromY: 8, toY: 24, verdict: 'stop' },
    ])
    expect(ofKind(checked, 'fault')).toEqual([{ kind: 'fault', x: MARGIN + 134, fromY: 8, toY: 24 }])
  })

  it('brackets minimum to maximum volume', () => {
    const ranged: RibbonInput = { ...planned, minimumAt: '2026-07-03T08:00:00Z', maximumAt: '2026-07-03T13:00:00Z' }
    expect(ofKind(ranged, 'bracket')).toEqual([
      { kind: 'bracket', fromX: MARGIN + 120, toX: MARGIN + 420, y: 1, height: 6, isFromOpen: false, isToOpen: false, fromLabel: '', toLabel: '' },
    ])
    const [tall] = ofKind(ranged, 'bracket', { width: 503.2, height: 56 })
    expect(tall).toMatchObject({ y: 10, fromLabel: 'min', toLabel: 'max' })
  })

  it('lets the bracket run on where a volume is reached long after the shift, rather than squeezing the shift', () => {
    const far: RibbonInput = { ...planned, minimumAt: '2026-07-03T07:00:00Z', maximumAt: '2026-07-09T06:00:00Z' }
    const layout = layoutRibbon(far, aMinuteAPixel)
    // one and a half times 8 h, and 2 % of that as margin
    expect(layout.toAt).toBe('2026-07-03T18:14:24.000Z')
    expect(ofKind(far, 'bracket')).toMatchObject([{ isFromOpen: false, isToOpen: true, toX: 501.2 }])
  })

  it('shows nothing of a bracket whose minimum is never reached in sight', () => {
    expect(ofKind({ ...planned, minimumAt: '2026-07-09T06:00:00Z' }, 'bracket')).toEqual([])
  })

  it('labels full hours of the zone it is read in, also where that zone is half an hour off', () => {
    const wide = { width: 340, height: 40 }
    const labels = (zone: string) => layoutRibbon(planned, { ...wide, zone }).shapes.flatMap(shape => shape.kind === 'tick' ? shape.label : [])
    expect(labels('UTC')).toEqual(['06:00', '08:00', '10:00', '12:00', '14:00'])
    expect(labels('Europe/London')).toEqual(['08:00', '10:00', '12:00', '14:00'])
    expect(labels('Asia/Kolkata')).toEqual(['12:00', '14:00', '16:00', '18:00'])
    expect(layoutRibbon(planned, { ...wide, labels: false }).shapes.some(shape => shape.kind === 'tick')).toBe(false)
  })

  it('keeps labels inside its edges', () => {
    const ticks = ofKind(planned, 'tick', { width: 340, height: 40 })
    expect(ticks.map(tick => tick.anchor)).toEqual(['start', 'middle', 'middle', 'middle', 'end'])
  })

  it('goes across midnight', () => {
    const night: RibbonInput = {
      ...planned,
      shift: { fromAt: '2026-07-03T22:00:00Z', toAt: '2026-07-04T06:00:00Z' },
      nowAt: '2026-07-04T07:00:00Z',
      spans: [{ fromAt: '2026-07-03T22:00:00Z', toAt: '2026-07-04T06:00:00Z' }],
    }
    expect(ofKind(night, 'solid')).toMatchObject([{ x: MARGIN, width: 480 }])
    expect(ofKind(night, 'tick', { width: 340, height: 40 }).map(tick => tick.label)).toEqual(['22:00', '00:00', '02:00', '04:00', '06:00'])
  })

  it('labels the hour that comes twice once, and no hour that does not exist', () => {
    const size = { width: 900, height: 40, zone: 'Europe/London' }
    const autumn = ofKind({ ...planned, shift: { fromAt: '2026-10-24T23:00:00Z', toAt: '2026-10-25T07:00:00Z' } }, 'tick', size)
    expect(autumn.map(tick => tick.label)).toEqual(['00:00', '01:00', '02:00', '03:00', '04:00', '05:00', '06:00', '07:00'])
    const spring = ofKind({ ...planned, shift: { fromAt: '2026-03-29T00:00:00Z', toAt: '2026-03-29T08:00:00Z' } }, 'tick', size)
    expect(spring.map(tick => tick.label)).toEqual(['00:00', '02:00', '03:00', '04:00', '05:00', '06:00', '07:00', '08:00', '09:00'])
  })

  it('gives a sample of no length a window one can read', () => {
    const blink: RibbonInput = {
      ...planned,
      shift: null,
      spans: [{ fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T06:00:00Z' }],
    }
    const layout = layoutRibbon(blink, aMinuteAPixel)
    expect([layout.fromAt, layout.toAt]).toEqual(['2026-07-03T05:40:00.000Z', '2026-07-03T06:20:00.000Z'])
    expect(ofKind(blink, 'solid')).toMatchObject([{ x: 251.6, width: 2 }])
  })

  it('never shows air as drawn where the stop lies before the start', () => {
    const backwards: RibbonInput = { ...planned, spans: [{ fromAt: '2026-07-03T10:00:00Z', toAt: '2026-07-03T07:00:00Z' }] }
    expect(ofKind(backwards, 'solid')).toMatchObject([{ x: MARGIN + 240, width: 2 }])
  })

  it('stands with nothing known at all', () => {
    const layout = layoutRibbon({ ...planned, shift: null }, aMinuteAPixel)
    expect([layout.fromAt, layout.toAt]).toEqual(['2026-07-03T04:50:24.000Z', '2026-07-03T13:09:36.000Z'])
    expect(layout.shapes.map(shape => shape.kind)).toContain('now')
  })

  it('leaves out what is no instant, knows no zone, has no room, and does not throw', () => {
    const broken: RibbonInput = {
      ...planned,
      nowAt: 'soon',
      spans: [{ fromAt: '', toAt: '2026-07-03T08:00:00Z' }, { fromAt: '2026-07-03T06:00:00Z', toAt: null }],
      checks: [{ at: '25 o\'clock', verdict: 'within' }],
      minimumAt: 'never',
      plannedEndAt: '9999-12-31T23:59:59Z',
    }
    const layout = layoutRibbon(broken, { width: 340, height: 40, zone: 'Nowhere/Such' })
    expect(layout.shapes.filter(shape => shape.kind === 'solid')).toHaveLength(1)
    expect(layout.shapes.every(shape => !Object.values(shape).some(value => typeof value === 'number' && !Number.isFinite(value)))).toBe(true)
    expect(layoutRibbon(planned, { width: 0, height: 40 }).shapes).toEqual([])
    expect(layoutRibbon(planned, { width: Number.NaN, height: 40 }).shapes).toEqual([])
  })
})
