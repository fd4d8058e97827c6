import { flowChangePercent, flowChangeVerdict } from '#shared/domain/deviation'
import type { Settings } from '#shared/records/settings'
import { checkThresholds, settingAt, type FlowSetting } from './flow-settings'
import type { Placed } from './placed-events'
import { atSampling, type PumpFlowFacts } from './pump-flows'
import type { RunTimeline } from './run-timeline'
import type { CheckSummary } from './sheet-assessment'

/**
 * Flow checks against the flow that was set: the one read before the run, or the one a reset left; without either, the
 * planned one. What a rotameter showed is brought to the conditions of sampling, where all of them are known; an electronic
 * indicator never is.
 */
export function checkSummaries(
  checks: readonly Placed<'flow-check'>[], settings: readonly FlowSetting[], flows: ReadonlyMap<string, PumpFlowFacts>,
  plannedLitresPerMinute: number | null, organisation: Settings,
): CheckSummary[] {
  return checks.map(({ event, at }) => {
    const { pumpId, litresPerMinute: asRead, by } = event.data
    const set = settingAt(settings, pumpId, at)?.startLitresPerMinute ?? plannedLitresPerMinute
    const pump = flows.get(pumpId)
    const isCorrected = asRead !== null && by === 'indicator' && pump?.calibration != null && pump.sampling !== null
    const flow = isCorrected ? atSampling(asRead, pump.calibration!, pump.sampling!) : asRead
    const percent = flow !== null && set !== null ? flowChangePercent(set, flow) : null
    const verdict = percent === null ? null : flowChangeVerdict(percent, checkThresholds(organisation))
    return { event, setLitresPerMinute: set, litresPerMinute: flow, isCorrected, percent, verdict }
  })
}

/**
 * When the next flow check is due, in milliseconds since 1970: soon after the start, a swap or a reset, then at intervals.
 * Null while nothing runs; a check that falls into a pause is due when the pump draws again.
 */
export function nextCheckDue(timeline: RunTimeline, checks: readonly Placed<'flow-check'>[], resets: readonly Placed<'flow-reset'>[], settings: Settings): number | null {
  if (timeline.state !== 'running' || timeline.startedAt === null) return null
  const anew = Math.max(timeline.startedAt, timeline.swaps.at(-1)?.at ?? -Infinity, resets.at(-1)?.at ?? -Infinity)
  const checked = checks.findLast(({ event, at }) => at >= anew && event.data.pumpId === timeline.pumpId)
  return checked ? checked.at + settings.checkEveryMinutes * 60_000 : anew + settings.firstCheckAfterMinutes * 60_000
}
