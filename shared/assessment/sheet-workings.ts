import { rotameterWorking } from '#shared/domain/correction-workings'
import { flowChangeWorking, flowUsedWorking, indicatorAccuracyWorking, meanFlowWorking } from '#shared/domain/flow-workings'
import { instantText } from '#shared/domain/instant'
import { diffusiveVolumeWorking, minutesLeftWorking, sampledMinutesWorking, sampledVolumeWorking, segmentedVolumeWorking, shiftCoverageWorking } from '#shared/domain/volume-workings'
import type { Working } from '#shared/domain/working'
import { flowChoiceOf } from './flow-segments'
import type { FlowSetting } from './flow-settings'
import { rotameterInput, type PumpFlowFacts } from './pump-flows'
import type { FlowSummary, WorkingKey } from './sheet-assessment'
import type { SheetFacts } from './sheet-facts'

/** How each number of the sheet came about. A number that is not there has no working. */
export function sheetWorkings(facts: SheetFacts): Partial<Record<WorkingKey, Working>> {
  const flows = facts.pumpId === null ? undefined : facts.flows.get(facts.pumpId)
  const entries: [WorkingKey, Working | null][] = [
    ['mean-before', flows?.before ? meanWorking(flows.before, 'flow before') : null],
    ['mean-after', flows?.after ? meanWorking(flows.after, 'flow after') : null],
    ['change', changeWorking(currentChange(facts))],
    ['correction', correctionWorking(flows)],
    ['flow-used', flowWorking(facts, flows)],
    ['minutes', minutesWorking(facts)],
    ['volume', volumeWorking(facts)],
    ['accuracy', accuracyWorking(facts)],
    ['projection', projectionWorking(facts)],
    ['coverage', facts.share && facts.share.spans.length > 0 ? shiftCoverageWorking(facts.share.shift, facts.share.spans) : null],
  ]
  return Object.fromEntries(entries.filter(entry => entry[1] !== null))
}

/** The setting whose change of flow stands for the sheet: the current pump's, else the last one that has any. */
export function currentChange(facts: SheetFacts): FlowSetting | null {
  if (facts.currentSetting?.change) return facts.currentSetting
  return facts.flowSettings.findLast(setting => setting.change !== null) ?? null
}

function meanWorking(summary: FlowSummary, from: string): Working {
  return meanFlowWorking(summary.readings.map(reading => reading.data.litresPerMinute), from)
}

function changeWorking(setting: FlowSetting | null): Working | null {
  if (!setting?.change || setting.startLitresPerMinute === null || setting.endLitresPerMinute === null) return null
  return flowChangeWorking(setting.startLitresPerMinute, setting.endLitresPerMinute)
}

function correctionWorking(flows: PumpFlowFacts | undefined): Working | null {
  const mean = flows?.before?.meanLitresPerMinute ?? flows?.after?.meanLitresPerMinute
  if (mean === undefined || !flows?.calibration || !flows.sampling) return null
  return rotameterWorking(rotameterInput(mean, flows.calibration, flows.sampling))
}

function flowWorking(facts: SheetFacts, flows: PumpFlowFacts | undefined): Working | null {
  const segment = facts.segments.at(-1)
  const working = flowUsedWorking(segment?.choice ?? flowChoiceOf(facts.currentSetting, facts.choice))
  if (!working || facts.air !== 'pumped') return null
  return { ...working, note: [working.note, correctionNote(facts, flows)].filter(Boolean).join(' ') }
}

function correctionNote(facts: SheetFacts, flows: PumpFlowFacts | undefined): string {
  if (flows?.isCorrected) return 'The flows are brought to the conditions of sampling, because this pump shows its flow with a rotameter.'
  if (flows?.lacksConditions) return 'Not corrected for pressure and temperature: they are not all noted.'
  if (facts.pump(facts.pumpId)?.indicator === 'electronic') return 'Not corrected for pressure and temperature: this pump measures its flow electronically, and the rotameter formula must not be used on it.'
  return ''
}

function minutesWorking({ run, timeline, sampledMinutes }: SheetFacts): Working | null {
  if (!run || sampledMinutes === null || timeline.stretches.length === 0) return null
  const working = sampledMinutesWorking(run)
  return timeline.stoppedAt === null ? { ...working, note: `Up to ${run.stoppedAt}: it is not stopped. ${working.note ?? ''}`.trim() } : working
}

function volumeWorking(facts: SheetFacts): Working | null {
  const { air, sheet, segments, sampledMinutes, volumeLitres } = facts
  if (volumeLitres === null || sampledMinutes === null) return null
  if (air === 'diffusive') return sheet.uptakeMillilitresPerMinute === null ? null : diffusiveVolumeWorking(sheet.uptakeMillilitresPerMinute, sampledMinutes)
  const known = segments.flatMap(({ litresPerMinute, minutes }) => litresPerMinute === null ? [] : [{ litresPerMinute, minutes }])
  const only = known.length === 1 ? known[0] : undefined
  return only ? sampledVolumeWorking(only.litresPerMinute, only.minutes) : segmentedVolumeWorking(known)
}

function accuracyWorking(facts: SheetFacts): Working | null {
  const pump = facts.pump(facts.pumpId)
  const flow = indicatedFlow(facts)
  return pump && flow !== null ? indicatorAccuracyWorking(pump.accuracy, flow) : null
}

/** The flow on the pump's own scale: as read before the run, else as planned. */
export function indicatedFlow(facts: SheetFacts): number | null {
  if (facts.pumpId === null) return null
  return facts.flows.get(facts.pumpId)?.before?.meanLitresPerMinute ?? facts.sheet.plannedFlowLitresPerMinute
}

function projectionWorking(facts: SheetFacts): Working | null {
  const { volumeLitres, range, timeline, now } = facts
  const flow = facts.segments.at(-1)?.litresPerMinute
  if (volumeLitres === null || !flow || (timeline.state !== 'running' && timeline.state !== 'paused')) return null
  const target = [range.minimumLitres, range.maximumLitres].find(litres => litres !== null && litres > volumeLitres)
  if (target == null) return null
  const working = minutesLeftWorking(volumeLitres, target, flow)
  return working && { ...working, note: `From ${instantText(now)}. ${working.note ?? ''}`.trim() }
}
