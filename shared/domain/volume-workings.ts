import { shiftCoverage } from './coverage'
import { minutesBetween, runSpans, sampledMinutes, type Run, type Span } from './duration'
import { minutesToVolume } from './projection'
import { diffusiveVolume, sampledVolume, segmentedVolume, type Segment } from './volume'
import type { Working } from './working'

/**
 * Working of the sampled minutes, with every span in which air was drawn.
 *
 * @param run start, stop and pauses, as for `sampledMinutes`
 * @returns the working, result in min
 * @throws RangeError as `sampledMinutes`
 * @source as `sampledMinutes`
 * @example sampledMinutesWorking({ startedAt: '2026-07-03T07:00:00Z', stoppedAt: '2026-07-03T09:00:00Z', pauses: [] }).result // { value: 120, unit: 'min' }
 */
export function sampledMinutesWorking(run: Run): Working {
  return {
    title: 'Sampled minutes',
    formula: 'sum of the spans in which air was drawn: stop - start, pauses taken off once',
    inputs: [
      { name: 'start', value: run.startedAt, unit: '', from: 'timer' },
      { name: 'stop', value: run.stoppedAt, unit: '', from: 'timer' },
      ...run.pauses.map((pause, place) => (
        { name: `pause ${place + 1}`, value: `${pause.fromAt} to ${pause.toAt ?? 'the stop'}`, unit: '', from: 'timer' }
      )),
      ...runSpans(run).map((span, place) => (
        { name: `air drawn ${place + 1}`, value: minutesBetween(span.fromAt, span.toAt), unit: 'min', from: `${span.fromAt} to ${span.toAt}` }
      )),
    ],
    result: { value: sampledMinutes(run), unit: 'min' },
    source: 'common practice: running time of the pump',
    note: 'Instants are in UTC, so a change of the clocks does not change the minutes.',
  }
}

/**
 * Working of the volume of a pump that ran with one flow.
 *
 * @param flowLitresPerMinute flow used, L/min, 0 or more
 * @param minutes sampled minutes, 0 or more
 * @returns the working, result in L
 * @throws RangeError as `sampledVolume`
 * @source as `sampledVolume`
 * @example sampledVolumeWorking(1.97, 450).result // { value: 886.5, unit: 'L' }
 */
export function sampledVolumeWorking(flowLitresPerMinute: number, minutes: number): Working {
  return {
    title: 'Sampled volume',
    formula: 'flow used × sampled minutes',
    inputs: [
      { name: 'flow used', value: flowLitresPerMinute, unit: 'L/min', from: 'Flow used' },
      { name: 'sampled minutes', value: minutes, unit: 'min', from: 'Sampled minutes' },
    ],
    result: { value: sampledVolume(flowLitresPerMinute, minutes), unit: 'L' },
    source: 'NIOSH Manual of Analytical Methods, chapter D: V = Q t',
  }
}

/**
 * Working of the volume over several segments (pump swapped, or flow set anew).
 *
 * @param segments flow and minutes of each segment
 * @returns the working, result in L
 * @throws RangeError as `segmentedVolume`
 * @source as `segmentedVolume`
 * @example segmentedVolumeWorking([{ litresPerMinute: 2, minutes: 240 }, { litresPerMinute: 1.9, minutes: 210 }]).result // { value: 879, unit: 'L' }
 */
export function segmentedVolumeWorking(segments: readonly Segment[]): Working {
  return {
    title: 'Sampled volume',
    formula: 'sum of flow × minutes over the segments',
    inputs: segments.flatMap((segment, place) => [
      { name: `flow in segment ${place + 1}`, value: segment.litresPerMinute, unit: 'L/min', from: 'Flow used' },
      { name: `minutes in segment ${place + 1}`, value: segment.minutes, unit: 'min', from: 'Sampled minutes' },
      { name: `volume of segment ${place + 1}`, value: sampledVolume(segment.litresPerMinute, segment.minutes), unit: 'L', from: 'this working' },
    ]),
    result: { value: segmentedVolume(segments).litres, unit: 'L' },
    source: 'NIOSH Manual of Analytical Methods, chapter D: V = Q t, summed',
    note: 'A segment ends where the pump was swapped or its flow was set anew.',
  }
}

/**
 * Working of the volume a diffusive sampler stands for.
 *
 * @param uptakeMillilitresPerMinute uptake rate, mL/min, above 0
 * @param minutes time it was open, min, 0 or more
 * @returns the working, result in L
 * @throws RangeError as `diffusiveVolume`
 * @source as `diffusiveVolume`
 * @example diffusiveVolumeWorking(35, 480).result // { value: 16.8, unit: 'L' }
 */
export function diffusiveVolumeWorking(uptakeMillilitresPerMinute: number, minutes: number): Working {
  return {
    title: 'Equivalent volume',
    formula: 'uptake rate × sampled minutes / 1000',
    inputs: [
      { name: 'uptake rate', value: uptakeMillilitresPerMinute, unit: 'mL/min', from: 'the sampler' },
      { name: 'sampled minutes', value: minutes, unit: 'min', from: 'Sampled minutes' },
    ],
    result: { value: diffusiveVolume(uptakeMillilitresPerMinute, minutes), unit: 'L' },
    source: 'definition of the uptake rate: V = U t',
  }
}

/**
 * Working of the minutes of air that are left until a volume is reached.
 *
 * @param litresSoFar volume drawn, L, 0 or more
 * @param targetLitres volume wanted, L, 0 or more
 * @param flowLitresPerMinute flow from now on, L/min, 0 or more
 * @returns the working, result in min, or null when the volume is reached already or the pump draws nothing
 * @throws RangeError as `minutesToVolume`
 * @source as `minutesToVolume`
 * @example minutesLeftWorking(100, 400, 2)?.result // { value: 150, unit: 'min' }
 */
export function minutesLeftWorking(litresSoFar: number, targetLitres: number, flowLitresPerMinute: number): Working | null {
  if (litresSoFar >= targetLitres || flowLitresPerMinute === 0) return null
  return {
    title: 'Minutes left',
    formula: '(volume wanted - volume so far) / flow',
    inputs: [
      { name: 'volume wanted', value: targetLitres, unit: 'L', from: 'the method' },
      { name: 'volume so far', value: litresSoFar, unit: 'L', from: 'Sampled volume' },
      { name: 'flow', value: flowLitresPerMinute, unit: 'L/min', from: 'flow before or last flow check' },
    ],
    result: { value: minutesToVolume(targetLitres - litresSoFar, flowLitresPerMinute), unit: 'min' },
    source: 't = V / Q',
    note: 'If the pump runs on with this flow and without a pause.',
  }
}

/**
 * Working of the share of a shift that was sampled.
 *
 * @param shift begin and end of the shift as instants
 * @param spans spans in which air was drawn, of one sample or of several
 * @returns the working, result in %
 * @throws RangeError as `shiftCoverage`
 * @source as `shiftCoverage`
 * @example shiftCoverageWorking({ fromAt: '2026-07-03T06:00:00Z', toAt: '2026-07-03T14:00:00Z' },
 *   [{ fromAt: '2026-07-03T07:00:00Z', toAt: '2026-07-03T14:00:00Z' }]).result // { value: 87.5, unit: '%' }
 */
export function shiftCoverageWorking(shift: Span, spans: readonly Span[]): Working {
  const coverage = shiftCoverage(shift, spans)
  return {
    title: 'Share of the shift covered',
    formula: 'minutes of the shift with air drawn / minutes of the shift × 100',
    inputs: [
      { name: 'begin of the shift', value: shift.fromAt, unit: '', from: 'the sheet' },
      { name: 'end of the shift', value: shift.toAt, unit: '', from: 'the sheet' },
      { name: 'minutes of the shift', value: coverage.shiftMinutes, unit: 'min' },
      { name: 'minutes with air drawn', value: coverage.coveredMinutes, unit: 'min', from: 'Sampled minutes' },
    ],
    result: { value: coverage.percent, unit: '%' },
    source: 'common practice: at least 7 of 8 hours',
  }
}
