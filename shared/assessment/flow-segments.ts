import { unionMinutes } from '#shared/domain/duration'
import type { FlowUsed, FlowUsedInput } from '#shared/domain/flow-used'
import { flowUsed } from '#shared/domain/flow-used'
import { flowUsedWorking } from '#shared/domain/flow-workings'
import { instantText } from '#shared/domain/instant'
import { sampledVolume } from '#shared/domain/volume'
import type { FlowSetting } from './flow-settings'
import type { RunTimeline, Stretch } from './run-timeline'
import type { FlowSegment } from './sheet-assessment'

/** A segment with what its flow was made from. */
export interface SegmentFacts extends FlowSegment {
  settingId: string
  stretches: readonly Stretch[]
  used: FlowUsed | null
  /** What the flow used was chosen from, for its working. */
  choice: FlowUsedInput
}

/** What decides which flow stands for a segment, apart from the readings. */
export interface FlowChoice { nominal: number | null, useNominal: boolean, attentionPercent: number }

/**
 * The run cut where the pump was swapped or its flow was set anew; a pause does not cut it. For each segment one flow stands:
 * chosen by `flowUsed` from the flow it began and the flow it ended with.
 *
 * @param timeline the run
 * @param settings every pump's settings
 * @param choice nominal flow and threshold
 * @param until end of an open stretch: now, in milliseconds since 1970
 */
export function flowSegments(timeline: RunTimeline, settings: readonly FlowSetting[], choice: FlowChoice, until: number): SegmentFacts[] {
  const groups: Stretch[][] = []
  for (const stretch of timeline.stretches) {
    const group = groups.at(-1)
    const last = group?.at(-1)
    if (group && last && last.pumpId === stretch.pumpId && last.settingId === stretch.settingId) group.push(stretch)
    else groups.push([stretch])
  }
  return groups.map(group => segmentOf(group, settings, choice, until))
    // A pump that was swapped in and out again in the same minute of a pause drew nothing.
    .filter((segment, place, all) => segment.minutes > 0 || place === all.length - 1)
}

function segmentOf(stretches: readonly Stretch[], settings: readonly FlowSetting[], choice: FlowChoice, until: number): SegmentFacts {
  const first = stretches[0]!
  const last = stretches.at(-1)!
  const minutes = unionMinutes(stretches.map(stretch => ({ fromAt: instantText(stretch.from), toAt: instantText(endOf(stretch, until)) })))
  const setting = settings.find(candidate => candidate.pumpId === first.pumpId && candidate.settingId === first.settingId) ?? null
  const input = flowChoiceOf(setting, choice)
  const used = flowUsed(input)
  return {
    pumpId: first.pumpId, settingId: first.settingId, stretches,
    fromAt: instantText(first.from), toAt: instantText(endOf(last, until)), minutes,
    litresPerMinute: used?.litresPerMinute ?? null,
    rule: flowRuleInWords(input) ?? 'No flow was read of this pump.',
    litres: used ? sampledVolume(used.litresPerMinute, minutes) : null,
    used, choice: input,
  }
}

/** What `flowUsed` chooses from, for one setting. */
export function flowChoiceOf(setting: FlowSetting | null, choice: FlowChoice): FlowUsedInput {
  return { before: setting?.startLitresPerMinute ?? null, after: setting?.endLitresPerMinute ?? null, ...choice }
}

/** Which flow stands and why, as the working says it. */
export function flowRuleInWords(input: FlowUsedInput): string | null {
  return flowUsedWorking(input)?.note ?? null
}

/** An open stretch reaches to now; on a clock that was set back, it has no minutes yet rather than fewer than none. */
export function endOf(stretch: Stretch, until: number): number {
  return Math.max(stretch.from, stretch.to ?? until)
}

/**
 * The instant at which the drawn volume passed a mark, walking the segments; null when it has not yet, or a flow is missing.
 *
 * @param segments in order
 * @param litres the mark, L
 * @param until end of an open stretch, milliseconds since 1970
 */
export function passedAt(segments: readonly SegmentFacts[], litres: number, until: number): number | null {
  let drawn = 0
  for (const segment of segments) {
    if (segment.litresPerMinute === null) return null
    for (const stretch of segment.stretches) {
      const minutes = (endOf(stretch, until) - stretch.from) / 60_000
      const litresHere = sampledVolume(segment.litresPerMinute, minutes)
      if (litresHere > 0 && drawn + litresHere >= litres) return stretch.from + (litres - drawn) / segment.litresPerMinute * 60_000
      drawn += litresHere
    }
  }
  return null
}
