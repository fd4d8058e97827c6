import { requireAbove, requireAtLeast, requireSome } from './check'

export interface ReadingAccuracyRange {
  /** L/min, 0 or more */
  fromLitresPerMinute: number
  /** L/min, not below the start of the range */
  toLitresPerMinute: number
  /** accuracy, ± % of the reading, above 0 */
  percent: number
}

/** Accuracy of a pump's flow indicator, as its maker states it. */
export type IndicatorAccuracy
  = | { kind: 'percent-of-reading', ranges: readonly ReadingAccuracyRange[] }
    | { kind: 'percent-of-full-scale', percent: number, fullScaleLitresPerMinute: number }

export type AccuracyAtFlow
  = | { outside?: false, percent: number, litresPerMinute: number }
  /** the maker says nothing about this flow */
    | { outside: true }

/** An electronic indicator with a laminar flow element, as commonly built. @source common practice, from memory */
export const COMMON_LAMINAR_FLOW_ACCURACY: IndicatorAccuracy = {
  kind: 'percent-of-reading',
  ranges: [
    { fromLitresPerMinute: 0.5, toLitresPerMinute: 1, percent: 5 },
    { fromLitresPerMinute: 1, toLitresPerMinute: 3, percent: 2.5 },
  ],
}

/** A mechanical indicator (a float in a tube) on a 5 L/min pump, as commonly built. @source common practice, from memory */
export const COMMON_MECHANICAL_ACCURACY: IndicatorAccuracy = {
  kind: 'percent-of-full-scale',
  percent: 5,
  fullScaleLitresPerMinute: 5,
}

/**
 * How far a pump's own indicator may be off at one flow.
 *
 * A percentage of full scale is an amount in L/min that stays the same down the scale, so in percent of what is read it grows
 * as the flow gets smaller: 5 % of a 5 L/min scale is 0.25 L/min, which is 12.5 % at 2 L/min. Where two ranges of a maker
 * meet at this flow, the larger percentage counts.
 *
 * @param accuracy what the maker states
 * @param flowLitresPerMinute flow shown, L/min, 0 or more
 * @returns accuracy at that flow, ± % of the flow and ± L/min, or that the flow is outside what the maker states
 * @throws RangeError when a value is outside its range
 * @source arithmetic on the maker's statement; 2 % of 5 L/min is 0.1 L/min, 5.88 % at 1.7 L/min
 * @example accuracyPercentAt(COMMON_MECHANICAL_ACCURACY, 2) // { percent: 12.5, litresPerMinute: 0.25 }
 */
export function accuracyPercentAt(accuracy: IndicatorAccuracy, flowLitresPerMinute: number): AccuracyAtFlow {
  requireAtLeast('accuracyPercentAt', 'flowLitresPerMinute', flowLitresPerMinute, 0)
  return accuracy.kind === 'percent-of-full-scale'
    ? ofFullScale(accuracy.percent, accuracy.fullScaleLitresPerMinute, flowLitresPerMinute)
    : ofReading(accuracy.ranges, flowLitresPerMinute)
}

function ofFullScale(percent: number, fullScale: number, flow: number): AccuracyAtFlow {
  requireAbove('accuracyPercentAt', 'percent', percent, 0)
  requireAbove('accuracyPercentAt', 'fullScaleLitresPerMinute', fullScale, 0)
  // At no flow there is nothing to take a percentage of.
  if (flow === 0 || isAbove(flow, fullScale)) return { outside: true }
  return { percent: percent * fullScale / flow, litresPerMinute: percent * fullScale / 100 }
}

function ofReading(ranges: readonly ReadingAccuracyRange[], flow: number): AccuracyAtFlow {
  requireSome('accuracyPercentAt', 'ranges', ranges)
  ranges.forEach(checkRange)
  const percents = ranges
    .filter(range => !isAbove(range.fromLitresPerMinute, flow) && !isAbove(flow, range.toLitresPerMinute))
    .map(range => range.percent)
  if (flow === 0 || percents.length === 0) return { outside: true }
  const percent = Math.max(...percents)
  return { percent, litresPerMinute: percent * flow / 100 }
}

function checkRange(range: ReadingAccuracyRange, place: number): void {
  const name = `ranges[${place}]`
  requireAtLeast('accuracyPercentAt', `${name}.fromLitresPerMinute`, range.fromLitresPerMinute, 0)
  requireAbove('accuracyPercentAt', `${name}.percent`, range.percent, 0)
  requireAtLeast('accuracyPercentAt', `${name}.toLitresPerMinute`, range.toLitresPerMinute, range.fromLitresPerMinute)
}

/** A mean of readings that should be exactly 1 may come out a hair above it: still in the range that ends at 1. */
function isAbove(flow: number, bound: number): boolean {
  return flow - bound > 1e-9 * bound
}
