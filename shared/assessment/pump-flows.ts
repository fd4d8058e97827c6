import { meanFlow, spreadPercent } from '#shared/domain/calibration'
import { isRotameterCorrectionApplicable, rotameterCorrectedFlow } from '#shared/domain/correction'
import type { Pump } from '#shared/records/pump'
import { areKnown, readingConditions, type AirConditions, type KnownConditions } from './conditions'
import type { Placed } from './placed-events'
import type { FlowSummary, PumpFlows } from './sheet-assessment'

/** A pump's flows with what a rotameter needs to be brought to the conditions of sampling. */
export interface PumpFlowFacts extends PumpFlows {
  /** Conditions where its flow before was read; null when it is not corrected. */
  calibration: KnownConditions | null
  sampling: KnownConditions | null
  /** A rotameter whose conditions are not all noted: its flows stand as read. */
  lacksConditions: boolean
}

/**
 * Flow readings put together by pump.
 *
 * Only a pump with a rotameter is ever corrected, and only when temperature and station pressure are known for each set of its
 * readings and for the sampling: correcting one of two flows would make a change where there is none.
 *
 * @param readings standing readings in order
 * @param pumps records of the pumps; one that is absent is not corrected
 * @param sampling conditions where the sample was taken
 */
export function pumpFlows(
  readings: readonly Placed<'flow-reading'>[], pumps: Readonly<Record<string, Pump>>, sampling: AirConditions,
): Map<string, PumpFlowFacts> {
  const byPump = new Map<string, { before: FlowSummary['readings'], after: FlowSummary['readings'] }>()
  for (const { event } of readings) {
    let sets = byPump.get(event.data.pumpId)
    if (!sets) byPump.set(event.data.pumpId, sets = { before: [], after: [] })
    sets[event.data.when].push(event)
  }
  const flows = new Map<string, PumpFlowFacts>()
  for (const [pumpId, sets] of byPump) {
    flows.set(pumpId, flowsOf(pumpId, summary(pumpId, sets.before), summary(pumpId, sets.after), pumps[pumpId], sampling))
  }
  return flows
}

function summary(pumpId: string, readings: FlowSummary['readings']): FlowSummary | null {
  if (readings.length === 0) return null
  const values = readings.map(reading => reading.data.litresPerMinute)
  return { pumpId, readings, meanLitresPerMinute: meanFlow(values), spreadPercent: spreadPercent(values) }
}

function flowsOf(pumpId: string, before: FlowSummary | null, after: FlowSummary | null, pump: Pump | undefined, sampling: AirConditions): PumpFlowFacts {
  const asRead = {
    pumpId, before, after,
    beforeLitresPerMinute: before?.meanLitresPerMinute ?? null,
    afterLitresPerMinute: after?.meanLitresPerMinute ?? null,
    isCorrected: false, calibration: null, sampling: null, lacksConditions: false,
  }
  if (!pump || !isRotameterCorrectionApplicable(pump.indicator)) return asRead
  const conditionsBefore = before && readingConditions(before.readings)
  const conditionsAfter = after && readingConditions(after.readings)
  if (!areKnown(sampling) || (conditionsBefore && !areKnown(conditionsBefore)) || (conditionsAfter && !areKnown(conditionsAfter))) {
    return { ...asRead, lacksConditions: true }
  }
  return {
    ...asRead,
    beforeLitresPerMinute: before && conditionsBefore && atSampling(before.meanLitresPerMinute, conditionsBefore, sampling),
    afterLitresPerMinute: after && conditionsAfter && atSampling(after.meanLitresPerMinute, conditionsAfter, sampling),
    isCorrected: true, calibration: conditionsBefore ?? conditionsAfter, sampling,
  }
}

/** A flow on a rotameter's scale, brought from the conditions it was calibrated at to those of sampling. */
export function atSampling(litresPerMinute: number, calibration: KnownConditions, sampling: KnownConditions): number {
  return rotameterCorrectedFlow(rotameterInput(litresPerMinute, calibration, sampling))
}

export function rotameterInput(litresPerMinute: number, calibration: KnownConditions, sampling: KnownConditions) {
  return {
    indicatedLitresPerMinute: litresPerMinute,
    calibrationPressureKilopascals: calibration.stationPressureKilopascals,
    calibrationTemperatureCelsius: calibration.temperatureCelsius,
    samplingPressureKilopascals: sampling.stationPressureKilopascals,
    samplingTemperatureCelsius: sampling.temperatureCelsius,
  }
}
