import { refuse, requireAbove, requireAtLeast } from './check'

export interface Segment {
  /** flow used in this segment, L/min, 0 or more */
  litresPerMinute: number
  /** minutes in which air was drawn, 0 or more */
  minutes: number
}

export interface SegmentedVolume {
  litres: number
  minutes: number
}

/**
 * Sampled air volume of a pump that ran with one flow.
 *
 * A flow of 0 gives no volume rather than an error: a pump found dead afterwards has 0 as its lower flow, and its sheet must
 * still open.
 *
 * @param flowLitresPerMinute flow used for the sample, L/min, 0 or more
 * @param sampledMinutes time the pump ran, pauses taken off, min, 0 or more
 * @returns volume, L
 * @throws RangeError when a value is negative or not finite
 * @source V = Q t; NIOSH NMAM, chapter D
 * @example sampledVolume(1.97, 450) // 886.5
 */
export function sampledVolume(flowLitresPerMinute: number, sampledMinutes: number): number {
  requireAtLeast('sampledVolume', 'flowLitresPerMinute', flowLitresPerMinute, 0)
  requireAtLeast('sampledVolume', 'sampledMinutes', sampledMinutes, 0)
  return flowLitresPerMinute * sampledMinutes
}

/**
 * Sampled air volume of a train whose pump was swapped or whose flow was set anew: the sum over the segments between.
 *
 * @param segments flow and minutes of each segment, in any order
 * @returns volume in L, and the minutes it was drawn in; both 0 without segments
 * @throws RangeError when a value is negative or not finite
 * @source V = sum of Q t over the segments
 * @example segmentedVolume([{ litresPerMinute: 2, minutes: 240 }, { litresPerMinute: 1.9, minutes: 210 }]) // { litres: 879, minutes: 450 }
 */
export function segmentedVolume(segments: readonly Segment[]): SegmentedVolume {
  let litres = 0
  let minutes = 0
  segments.forEach((segment, place) => {
    requireAtLeast('segmentedVolume', `segments[${place}].litresPerMinute`, segment.litresPerMinute, 0)
    requireAtLeast('segmentedVolume', `segments[${place}].minutes`, segment.minutes, 0)
    litres += sampledVolume(segment.litresPerMinute, segment.minutes)
    minutes += segment.minutes
  })
  return { litres, minutes }
}

/**
 * Mean flow over several segments: the volume divided by the minutes, so that a long segment counts for more.
 *
 * @param segments flow and minutes of each segment; together more than 0 minutes
 * @returns flow, L/min
 * @throws RangeError when a value is out of range or the segments last 0 minutes together
 * @source Q = V / t
 * @example meanFlowOfSegments([{ litresPerMinute: 2, minutes: 300 }, { litresPerMinute: 1, minutes: 100 }]) // 1.75
 */
export function meanFlowOfSegments(segments: readonly Segment[]): number {
  const { litres, minutes } = segmentedVolume(segments)
  if (minutes === 0) refuse('meanFlowOfSegments', 'minutes of all segments together', 'above 0', minutes)
  return litres / minutes
}

/**
 * Volume that a diffusive sampler stands for: its uptake rate over the time it was open. There is no pump and no flow.
 *
 * @param uptakeMillilitresPerMinute uptake rate for the agent, mL/min, above 0
 * @param minutes time the sampler was open, min, 0 or more
 * @returns equivalent volume, L
 * @throws RangeError when a value is outside its range
 * @source V = U t; EN ISO 23320:2022, diffusive uptake rate (the clause from memory)
 * @example diffusiveVolume(35, 480) // 16.8
 */
export function diffusiveVolume(uptakeMillilitresPerMinute: number, minutes: number): number {
  requireAbove('diffusiveVolume', 'uptakeMillilitresPerMinute', uptakeMillilitresPerMinute, 0)
  requireAtLeast('diffusiveVolume', 'minutes', minutes, 0)
  return uptakeMillilitresPerMinute * minutes / 1000
}
