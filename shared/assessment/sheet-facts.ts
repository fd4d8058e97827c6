import { sampledMinutes } from '#shared/domain/duration'
import { instantText } from '#shared/domain/instant'
import { isZone } from '#shared/domain/local-time'
import { diffusiveVolume, segmentedVolume } from '#shared/domain/volume'
import type { Pump } from '#shared/records/pump'
import type { Air, Sheet } from '#shared/records/sheet'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import { samplingConditions, type AirConditions } from './conditions'
import { checkSummaries, nextCheckDue } from './flow-checks'
import { flowChoiceOf, flowSegments, type FlowChoice, type SegmentFacts } from './flow-segments'
import { flowSettings, settingAt, type FlowSetting } from './flow-settings'
import { placeEvents, type PlacedEvents } from './placed-events'
import { pumpFlows, type PumpFlowFacts } from './pump-flows'
import { runTimeline, type RunTimeline } from './run-timeline'
import { airOf } from './sample-kind'
import type { CheckSummary, SheetAssessment } from './sheet-assessment'
import { shiftShare, type ShiftShare } from './shift-share'
import { drawnSpans } from './spans'
import { volumeProjection } from './volume-projection'
import { volumeRange, type VolumeRange } from './volume-range'
import type { Run } from '#shared/domain/duration'

/** Everything the findings and the workings look at, worked out once. */
export interface SheetFacts {
  bundle: SheetBundle
  sheet: Sheet
  settings: SheetBundle['settings']
  nowAt: string
  now: number
  /** Zone of the place, for days and clock times. */
  zone: string
  air: Air
  events: PlacedEvents
  timeline: RunTimeline
  spans: SheetAssessment['spans']
  /** Start, stop or now, and pauses, as the formulas take them; null before the start. */
  run: Run | null
  sampledMinutes: number | null
  /** The pump that draws now or drew last, else the one chosen. */
  pumpId: string | null
  /** Pumps that drew air, else the one chosen. */
  pumpsInUse: readonly string[]
  pump: (pumpId: string | null) => Pump | null
  /** " of pump 12", when more than one pump was in use; '' otherwise. */
  ofPump: (pumpId: string | null) => string
  conditions: AirConditions
  flows: ReadonlyMap<string, PumpFlowFacts>
  flowSettings: readonly FlowSetting[]
  /** Whether a reset gave the pump a flow to begin with. */
  hasSetting: (pumpId: string) => boolean
  choice: FlowChoice
  segments: readonly SegmentFacts[]
  /** The setting that the current pump has, or would start with. */
  currentSetting: FlowSetting | null
  volumeLitres: number | null
  range: VolumeRange
  plannedEndAt: string | null
  projection: SheetAssessment['projection']
  checks: readonly CheckSummary[]
  nextCheckDueAt: string | null
  share: ShiftShare | null
}

/** @param nowAt the instant it is looked at, ISO 8601 */
export function sheetFacts(bundle: SheetBundle, nowAt: string): SheetFacts {
  const { document, settings, method, sampler } = bundle
  const { sheet } = document
  const now = Date.parse(nowAt)
  const air = airOf(sheet)
  const events = placeEvents(document.events)
  const timeline = runTimeline(events, sheet.pumpId)
  const spans = drawnSpans(timeline)
  const run = runOf(timeline, now)
  const minutes = run && (timeline.stretches.length === 0 ? 0 : sampledMinutes(run))
  const pumpId = air === 'pumped' ? timeline.pumpId ?? sheet.pumpId : null
  const pumpsInUse = air === 'pumped' ? usedPumps(timeline, pumpId) : []
  const pump = (id: string | null) => id === null ? null : bundle.pumps[id] ?? null
  const conditions = samplingConditions(events.of('condition'))
  const flows = pumpFlows(air === 'pumped' ? events.of('flow-reading') : [], bundle.pumps, conditions)
  const resets = air === 'pumped' ? events.of('flow-reset') : []
  const pumpSettings = flowSettings(flows, resets, settings)
  const choice: FlowChoice = {
    nominal: sampler?.designFlowLitresPerMinute ?? null,
    useNominal: method?.usesNominalFlow ?? false,
    attentionPercent: settings.flowChangeAttentionPercent,
  }
  const segments = air === 'pumped' ? flowSegments(timeline, pumpSettings, choice, now) : []
  const currentSetting = pumpId === null ? null : settingAt(pumpSettings, pumpId, Infinity)
  const range = volumeRange(method, bundle.agents)
  const volumeLitres = volumeOf(air, sheet, segments, minutes)
  const plannedEndAt = sheet.plannedEndAt ?? sheet.shiftEndsAt
  const isOpen = timeline.state === 'running' || timeline.state === 'paused'
  const checks = air === 'pumped' ? events.of('flow-check') : []
  const due = nextCheckDue(timeline, checks, resets, settings)

  return {
    bundle, sheet, settings, nowAt, now, air, events, timeline, spans, run, pumpId, pumpsInUse, pump, conditions, flows, choice, segments,
    currentSetting, volumeLitres, range, plannedEndAt,
    zone: zoneOf(bundle),
    sampledMinutes: minutes,
    ofPump: id => pumpsInUse.length > 1 ? ` of pump ${pump(id)?.serial ?? 'not known here'}` : '',
    flowSettings: pumpSettings,
    hasSetting: id => resets.some(({ event }) => event.data.pumpId === id),
    projection: volumeProjection({
      segments: air === 'diffusive' ? diffusiveSegments(timeline, sheet.uptakeMillilitresPerMinute, now) : segments,
      range, volumeLitres, isOpen, now, nowAt, plannedEndAt,
      litresPerMinute: air === 'diffusive'
        ? sheet.uptakeMillilitresPerMinute === null ? null : diffusiveVolume(sheet.uptakeMillilitresPerMinute, 1)
        : segments.at(-1)?.litresPerMinute ?? null,
    }),
    checks: checkSummaries(checks, pumpSettings, flows, sheet.plannedFlowLitresPerMinute, settings),
    nextCheckDueAt: due === null || air !== 'pumped' ? null : instantText(due),
    share: sheet.kind === 'personal' || sheet.kind === 'area' ? shiftShare(sheet, spans, bundle.siblings, nowAt) : null,
  }
}

function runOf(timeline: RunTimeline, now: number): Run | null {
  const { startedAt, stoppedAt } = timeline
  if (startedAt === null) return null
  // A stop before the start, or a clock set back to before it, leaves no minutes rather than fewer than none.
  const end = Math.max(startedAt, stoppedAt ?? now)
  return {
    startedAt: instantText(startedAt),
    stoppedAt: instantText(end),
    pauses: timeline.pauses.map(({ from, to }) => ({ fromAt: instantText(from), toAt: to === null ? null : instantText(to) })),
  }
}

function usedPumps(timeline: RunTimeline, chosen: string | null): string[] {
  const drew = timeline.stretches.filter(stretch => stretch.to === null || stretch.to > stretch.from).flatMap(stretch => stretch.pumpId ?? [])
  if (drew.length > 0) return [...new Set(drew)]
  return chosen === null ? [] : [chosen]
}

function volumeOf(air: Air, sheet: Sheet, segments: readonly SegmentFacts[], minutes: number | null): number | null {
  if (minutes === null || air === 'none') return null
  if (air === 'diffusive') return sheet.uptakeMillilitresPerMinute === null ? null : diffusiveVolume(sheet.uptakeMillilitresPerMinute, minutes)
  const known = segments.flatMap(({ litresPerMinute, minutes }) => litresPerMinute === null ? [] : [{ litresPerMinute, minutes }])
  return known.length === segments.length ? segmentedVolume(known).litres : null
}

/** A diffusive run as one segment at its uptake rate, to walk it for the volume marks. */
function diffusiveSegments(timeline: RunTimeline, uptakeMillilitresPerMinute: number | null, now: number): SegmentFacts[] {
  if (uptakeMillilitresPerMinute === null || timeline.startedAt === null) return []
  const litresPerMinute = diffusiveVolume(uptakeMillilitresPerMinute, 1)
  const toAt = instantText(Math.max(timeline.startedAt, timeline.stoppedAt ?? now))
  return [{
    pumpId: null, settingId: '', stretches: timeline.stretches, fromAt: instantText(timeline.startedAt), toAt, minutes: 0, litresPerMinute,
    rule: '', litres: null, used: null, choice: flowChoiceOf(null, { nominal: null, useNominal: false, attentionPercent: 0 }),
  }]
}

function zoneOf(bundle: SheetBundle): string {
  const zone = bundle.survey?.zone ?? bundle.document.events.at(-1)?.zone
  return zone !== undefined && isZone(zone) ? zone : 'UTC'
}
