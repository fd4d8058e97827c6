import { instantMilliseconds, instantText, isInstant } from '#shared/domain/instant'
import { localParts } from '#shared/domain/local-time'

/**
 * The ribbon: one sample drawn as a strip of cloth. Its length is the shift, it is solid where air was drawn, open where it was
 * paused, stitched where flow was checked, bracketed from minimum to maximum volume, dashed where it is still to come.
 * Board, sheet, review and print all draw what this one function lays out.
 */
export interface RibbonInput {
  shift: { fromAt: string, toAt: string } | null
  nowAt: string
  /** air drawn; `toAt` null while it runs */
  spans: readonly { fromAt: string, toAt: string | null, pumpId?: string | null }[]
  pauses: readonly { fromAt: string, toAt: string | null, reason: string | null }[]
  checks: readonly { at: string, verdict: RibbonVerdict }[]
  faults: readonly { at: string }[]
  plannedEndAt: string | null
  /** when the minimum volume is reached, or will be */
  minimumAt: string | null
  /** when the maximum volume is reached, or will be */
  maximumAt: string | null
  activities?: readonly { fromAt: string, toAt: string | null, label: string }[]
}

export const RIBBON_VERDICTS = ['within', 'attention', 'stop'] as const
export type RibbonVerdict = (typeof RIBBON_VERDICTS)[number]

export interface RibbonSize {
  /** px */
  width: number
  /** px; from 40 on there is room for the hours below */
  height: number
  /** IANA zone of the hours below; UTC when absent */
  zone?: string
  /** hours below and words at the bracket; on when absent */
  labels?: boolean
}

interface Box { x: number, y: number, width: number, height: number }

export type RibbonShape
  /** the chalk line of the planned shift, along the middle of the band */
  = | { kind: 'shift', fromX: number, toX: number, y: number }
  /** still to come */
    | Box & { kind: 'dashed' }
  /** air drawn; `notch` is the cut at the top right, px, 0 while it runs */
    | Box & { kind: 'solid', pumpId: string | null, notch: number }
  /** paused */
    | Box & { kind: 'open', reason: string | null }
  /** another pump from here on */
    | { kind: 'seam', x: number, fromY: number, toY: number }
    | Box & { kind: 'activity', label: string }
    | { kind: 'stitch', x: number, fromY: number, toY: number, verdict: RibbonVerdict }
    | { kind: 'fault', x: number, fromY: number, toY: number }
  /** minimum to maximum volume; an end that lies beyond the ribbon is open */
    | { kind: 'bracket', fromX: number, toX: number, y: number, height: number, isFromOpen: boolean, isToOpen: boolean, fromLabel: string, toLabel: string }
    | { kind: 'now', x: number, fromY: number, toY: number }
    | { kind: 'tick', x: number, y: number, label: string, anchor: 'start' | 'middle' | 'end' }

export interface RibbonLayout {
  width: number
  height: number
  /** first and last instant drawn */
  fromAt: string
  toAt: string
  /** where the cloth lies */
  band: { y: number, height: number }
  /** in the order in which they are drawn */
  shapes: RibbonShape[]
}

const MINUTE = 60_000
const HOUR = 60 * MINUTE
/** A ribbon of less would show a second as a stripe. */
const SHORTEST_WINDOW = 30 * MINUTE
/** A planned sample with no times at all. */
const EMPTY_WINDOW = 8 * HOUR
/** Air left and right of what is given, as a share of its length. */
const MARGIN_SHARE = 0.02
const LEAST_MARGIN = 5 * MINUTE
/** Volumes reached far away must not squeeze the shift: beyond this share of its length the bracket runs on. */
const FURTHEST_BRACKET_SHARE = 1.5
/** A minute of air must still be seen. */
const NARROWEST_PIECE = 2
const EDGE = 2
const LABEL_ROW = 16
const BRACKET_ROW = 8
const BRACKET_ROW_WITH_WORDS = 17
const HEIGHT_FOR_LABELS = 36
const HEIGHT_FOR_WORDS = 56
const NOTCH = 6
const LABEL_ROOM = 72
const HALF_LABEL = 18
const TICK_STEPS = [15 * MINUTE, 30 * MINUTE, HOUR, 2 * HOUR, 3 * HOUR, 4 * HOUR, 6 * HOUR, 12 * HOUR, 24 * HOUR]

/**
 * Lays a sample out as a ribbon.
 *
 * Never throws, whatever the phone's clock did: texts that are no instants are left out, a stop before its start has no length.
 *
 * @param input what is known of the sample, instants as ISO 8601 text with zone
 * @param size of the drawing, px, and the zone of its hours
 * @returns shapes in px, in drawing order; none when there is no room
 * @example layoutRibbon({ shift: { fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T14:00:00Z' }, ... }, { width: 340, height: 40 })
 */
export function layoutRibbon(input: RibbonInput, size: RibbonSize): RibbonLayout {
  const times = readTimes(input)
  const frame = frameOf(times)
  const hasLabels = size.labels !== false && size.height >= HEIGHT_FOR_LABELS
  const hasWords = hasLabels && size.height >= HEIGHT_FOR_WORDS
  const top = hasWords ? BRACKET_ROW_WITH_WORDS : BRACKET_ROW
  const band = { y: top, height: Math.max(4, size.height - top - (hasLabels ? LABEL_ROW : EDGE)) }
  const layout = { width: size.width, height: size.height, fromAt: instantText(frame.from), toAt: instantText(frame.to), band }
  if (!(size.width > 2 * EDGE) || !(size.height > 0)) return { ...layout, shapes: [] }

  const x = (at: number) => rounded(EDGE + (at - frame.from) / (frame.to - frame.from) * (size.width - 2 * EDGE))
  return {
    ...layout,
    shapes: [
      ...shiftLine(times, x, band),
      ...toCome(times, frame, x, band),
      ...airDrawn(times, x, band),
      ...paused(times, x, band),
      ...activityMarks(times, x, band),
      ...checkMarks(times, x, band),
      ...bracket(times, frame, x, top, hasWords),
      ...nowLine(times, frame, x, band),
      ...(hasLabels ? hours(frame, x, size) : []),
    ],
  }
}

interface Stretch { from: number, to: number, isOpen: boolean }
interface Times {
  now: number
  shift: Stretch | null
  spans: (Stretch & { pumpId: string | null })[]
  pauses: (Stretch & { reason: string | null })[]
  activities: (Stretch & { label: string })[]
  checks: { at: number, verdict: RibbonVerdict }[]
  faults: { at: number }[]
  plannedEnd: number | null
  minimum: number | null
  maximum: number | null
  /** Air is drawn now, or will be again: the timer has not been stopped. */
  isOngoing: boolean
}
interface Frame { from: number, to: number }
interface Band { y: number, height: number }
type Scale = (at: number) => number

function readTimes(input: RibbonInput): Times {
  const now = instant(input.nowAt) ?? latest(input)
  const spans = stretches(input.spans, now).map(([span, given]) => ({ ...span, pumpId: given.pumpId ?? null }))
  const pauses = stretches(input.pauses, now).map(([span, given]) => ({ ...span, reason: given.reason }))
  return {
    now,
    shift: input.shift ? stretches([input.shift], now)[0]?.[0] ?? null : null,
    spans: spans.sort((a, b) => a.from - b.from),
    pauses,
    activities: stretches(input.activities ?? [], now).map(([span, given]) => ({ ...span, label: given.label })),
    checks: input.checks.flatMap(({ at, verdict }) => withInstant(at, { verdict })),
    faults: input.faults.flatMap(({ at }) => withInstant(at, {})),
    plannedEnd: instant(input.plannedEndAt),
    minimum: instant(input.minimumAt),
    maximum: instant(input.maximumAt),
    isOngoing: [...spans, ...pauses].some(span => span.isOpen),
  }
}

/** Stands for now when the clock gave no instant. */
function latest(input: RibbonInput): number {
  const texts = [input.shift?.toAt, ...[...input.spans, ...input.pauses].flatMap(one => [one.fromAt, one.toAt])]
  return Math.max(0, ...texts.flatMap(text => instant(text ?? null) ?? []))
}

function instant(text: string | null): number | null {
  return text !== null && isInstant(text) ? instantMilliseconds(text) : null
}

function withInstant<Rest extends object>(text: string, rest: Rest): (Rest & { at: number })[] {
  const at = instant(text)
  return at === null ? [] : [{ ...rest, at }]
}

/** A stretch that ends before it begins has no length: air that was perhaps not drawn is never shown as drawn. */
function stretches<Given extends { fromAt: string, toAt: string | null }>(given: readonly Given[], now: number): [Stretch, Given][] {
  return given.flatMap((one): [Stretch, Given][] => {
    const from = instant(one.fromAt)
    const to = one.toAt === null ? now : instant(one.toAt)
    if (from === null || to === null) return []
    return [[{ from, to: Math.max(from, to), isOpen: one.toAt === null }, one]]
  })
}

function frameOf(times: Times): Frame {
  const given = [
    ...[times.shift, ...times.spans, ...times.pauses, ...times.activities].flatMap(one => one ? [one.from, one.to] : []),
    ...[...times.checks, ...times.faults].map(one => one.at),
    ...(times.plannedEnd === null ? [] : [times.plannedEnd]),
    ...(times.isOngoing ? [times.now] : []),
  ]
  if (given.length === 0) given.push(times.now, times.now + EMPTY_WINDOW)
  let from = Math.min(...given)
  let to = Math.max(...given)
  const furthest = from + Math.max(to - from, SHORTEST_WINDOW) * FURTHEST_BRACKET_SHARE
  for (const reached of [times.minimum, times.maximum]) {
    if (reached !== null && reached > to) to = Math.min(reached, furthest)
  }
  const short = Math.max(0, SHORTEST_WINDOW - (to - from))
  from -= short / 2
  to += short / 2
  const margin = Math.max(LEAST_MARGIN, (to - from) * MARGIN_SHARE)
  return { from: from - margin, to: to + margin }
}

function box(span: { from: number, to: number }, x: Scale, band: Band, narrowest = NARROWEST_PIECE): Box {
  const fromX = x(span.from)
  return { x: fromX, y: band.y, width: rounded(Math.max(narrowest, x(span.to) - fromX)), height: band.height }
}

function shiftLine({ shift }: Times, x: Scale, band: Band): RibbonShape[] {
  return shift ? [{ kind: 'shift', fromX: x(shift.from), toX: x(shift.to), y: rounded(band.y + band.height / 2) }] : []
}

function toCome(times: Times, frame: Frame, x: Scale, band: Band): RibbonShape[] {
  const isPlanned = times.spans.length === 0 && times.pauses.length === 0
  if (!times.isOngoing && !isPlanned) return []
  const end = times.plannedEnd ?? times.shift?.to ?? times.maximum ?? times.minimum
  if (end === null || end <= times.now) return []
  const from = isPlanned ? Math.max(times.now, times.shift?.from ?? frame.from, frame.from) : times.now
  const to = Math.min(end, frame.to)
  return to > from ? [{ kind: 'dashed', ...box({ from, to }, x, band, 0) }] : []
}

function airDrawn({ spans, isOngoing }: Times, x: Scale, band: Band): RibbonShape[] {
  return spans.flatMap((span, place): RibbonShape[] => {
    const piece = box(span, x, band)
    const before = spans[place - 1]
    const isLast = place === spans.length - 1
    const notch = isLast && !isOngoing ? Math.min(NOTCH, piece.width, piece.height / 2) : 0
    const solid: RibbonShape = { kind: 'solid', ...piece, pumpId: span.pumpId, notch }
    const isOtherPump = before !== undefined && before.pumpId !== span.pumpId
    return isOtherPump ? [solid, { kind: 'seam', x: piece.x, fromY: band.y, toY: band.y + band.height }] : [solid]
  })
}

function paused({ pauses }: Times, x: Scale, band: Band): RibbonShape[] {
  return pauses.map(pause => ({ kind: 'open', ...box(pause, x, band), reason: pause.reason }))
}

function activityMarks({ activities }: Times, x: Scale, band: Band): RibbonShape[] {
  const height = 4
  return activities.map(({ label, ...span }) => (
    { kind: 'activity', ...box(span, x, { y: band.y + band.height - height, height }), label }
  ))
}

function checkMarks({ checks, faults }: Times, x: Scale, band: Band): RibbonShape[] {
  const fromY = band.y
  const toY = band.y + band.height
  return [
    ...checks.map(({ at, verdict }): RibbonShape => ({ kind: 'stitch', x: x(at), fromY, toY, verdict })),
    ...faults.map(({ at }): RibbonShape => ({ kind: 'fault', x: x(at), fromY, toY })),
  ]
}

function bracket({ minimum, maximum }: Times, frame: Frame, x: Scale, row: number, hasWords: boolean): RibbonShape[] {
  if (minimum === null && maximum === null) return []
  const from = minimum ?? frame.from
  const to = maximum ?? frame.to
  if (to < from || from > frame.to || to < frame.from) return []
  const isFromOpen = minimum === null || minimum < frame.from
  const isToOpen = maximum === null || maximum > frame.to
  const height = 6
  return [{
    kind: 'bracket',
    fromX: x(Math.max(from, frame.from)),
    toX: x(Math.min(to, frame.to)),
    y: row - height - 1,
    height,
    isFromOpen,
    isToOpen,
    fromLabel: hasWords && !isFromOpen ? 'min' : '',
    toLabel: hasWords && !isToOpen ? 'max' : '',
  }]
}

function nowLine({ now }: Times, frame: Frame, x: Scale, band: Band): RibbonShape[] {
  if (now < frame.from || now > frame.to) return []
  return [{ kind: 'now', x: x(now), fromY: band.y - 4, toY: band.y + band.height + 2 }]
}

function hours(frame: Frame, x: Scale, size: RibbonSize): RibbonShape[] {
  const zone = size.zone ?? 'UTC'
  const room = LABEL_ROOM / (size.width - 2 * EDGE) * (frame.to - frame.from)
  const step = TICK_STEPS.find(one => one >= room) ?? Math.ceil(room / (24 * HOUR)) * 24 * HOUR
  const ticks: RibbonShape[] = []
  // Steps are counted on the wall clock, so that the labels are full hours in a zone of half hours and on the night the clocks change.
  const wallFrom = frame.from + offset(frame.from, zone)
  for (let wall = Math.ceil(wallFrom / step) * step, last = -Infinity; ; wall += step) {
    const at = wall - offset(wall - offset(wall, zone), zone)
    if (at > frame.to) return ticks
    if (at < frame.from || at <= last) continue
    last = at
    const tickX = x(at)
    const anchor = tickX < HALF_LABEL ? 'start' : tickX > size.width - HALF_LABEL ? 'end' : 'middle'
    const local = partsOf(at, zone)
    ticks.push({ kind: 'tick', x: tickX, y: size.height - LABEL_ROW, label: step >= 24 * HOUR ? local.dayOn.slice(5) : local.time, anchor })
  }
}

function offset(at: number, zone: string): number {
  return partsOf(at, zone).offsetMinutes * MINUTE
}

function partsOf(at: number, zone: string): { dayOn: string, time: string, offsetMinutes: number } {
  try {
    return localParts(instantText(at), zone)
  }
  catch {
    // A zone this engine does not know, or a year beyond 9999, must not take the drawing away.
    const text = instantText(at)
    return { dayOn: text.slice(0, 10), time: text.slice(11, 16), offsetMinutes: 0 }
  }
}

function rounded(px: number): number {
  return Math.round(px * 100) / 100
}
