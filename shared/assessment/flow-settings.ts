import { flowChangePercent, flowChangeVerdict } from '#shared/domain/deviation'
import type { Settings } from '#shared/records/settings'
import type { Placed } from './placed-events'
import { atSampling, type PumpFlowFacts } from './pump-flows'

/** The time in which a pump ran at one setting: from its flow before, or a reset, to the next reset or its flow after. */
export interface FlowSetting {
  pumpId: string
  /** '' for the flow read before the run, else the id of the reset that made it. */
  settingId: string
  /** Milliseconds since 1970; minus infinity for the first. */
  from: number
  startLitresPerMinute: number | null
  endLitresPerMinute: number | null
  startFrom: 'flow-before' | 'reset'
  endFrom: 'flow-after' | 'reset'
  change: { percent: number, verdict: 'within' | 'attention' | 'stop' } | null
}

/**
 * Every setting of every pump, in order. Without a reset that is one for each pump: flow before to flow after. The change of
 * flow is one setting's own; across a reset it would compare two different things.
 *
 * @param flows what was read of each pump
 * @param resets standing resets in order
 * @param settings thresholds of the organisation
 */
export function flowSettings(flows: ReadonlyMap<string, PumpFlowFacts>, resets: readonly Placed<'flow-reset'>[], settings: Settings): FlowSetting[] {
  const pumpIds = new Set([...flows.keys(), ...resets.map(({ event }) => event.data.pumpId)])
  return [...pumpIds].flatMap(pumpId => settingsOfPump(pumpId, flows.get(pumpId), resets.filter(({ event }) => event.data.pumpId === pumpId), settings))
}

function settingsOfPump(pumpId: string, flows: PumpFlowFacts | undefined, resets: readonly Placed<'flow-reset'>[], settings: Settings): FlowSetting[] {
  const onScale = (flow: number | null) => flow !== null && flows?.calibration && flows.sampling ? atSampling(flow, flows.calibration, flows.sampling) : flow
  const list: FlowSetting[] = []
  let start: Pick<FlowSetting, 'settingId' | 'from' | 'startLitresPerMinute' | 'startFrom'>
    = { settingId: '', from: -Infinity, startLitresPerMinute: flows?.beforeLitresPerMinute ?? null, startFrom: 'flow-before' }
  for (const { event, at } of resets) {
    list.push(settingOf(pumpId, start, onScale(event.data.fromLitresPerMinute), 'reset', settings))
    start = { settingId: event.id, from: at, startLitresPerMinute: onScale(event.data.toLitresPerMinute), startFrom: 'reset' }
  }
  list.push(settingOf(pumpId, start, flows?.afterLitresPerMinute ?? null, 'flow-after', settings))
  return list
}

function settingOf(
  pumpId: string, start: Pick<FlowSetting, 'settingId' | 'from' | 'startLitresPerMinute' | 'startFrom'>,
  endLitresPerMinute: number | null, endFrom: FlowSetting['endFrom'], settings: Settings,
): FlowSetting {
  return { pumpId, ...start, endLitresPerMinute, endFrom, change: changeOf(start.startLitresPerMinute, endLitresPerMinute, settings) }
}

function changeOf(before: number | null, after: number | null, settings: Settings): FlowSetting['change'] {
  if (before === null || after === null) return null
  const percent = flowChangePercent(before, after)
  return { percent, verdict: flowChangeVerdict(percent, changeThresholds(settings)) }
}

/** Two settings that a person changed one by one may cross; then the lower bound is the one that stops. */
export function changeThresholds(settings: Settings) {
  return orderedThresholds(settings.flowChangeAttentionPercent, settings.flowChangeStopPercent)
}

export function checkThresholds(settings: Settings) {
  return orderedThresholds(settings.flowCheckAttentionPercent, settings.flowCheckStopPercent)
}

function orderedThresholds(attentionPercent: number, stopPercent: number) {
  return { attentionPercent: Math.min(attentionPercent, stopPercent), stopPercent }
}

/** The setting a pump ran at, at an instant; null for a pump of which nothing is known. */
export function settingAt(list: readonly FlowSetting[], pumpId: string, at: number): FlowSetting | null {
  return list.findLast(setting => setting.pumpId === pumpId && setting.from <= at) ?? null
}
