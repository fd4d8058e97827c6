import { isCalibratorInDate } from '#shared/domain/calibration'
import type { Agent } from '#shared/records/agent'
import type { Calibrator } from '#shared/records/calibrator'
import type { Method } from '#shared/records/method'
import type { Pump } from '#shared/records/pump'
import type { Sampler } from '#shared/records/sampler'
import type { Identified } from '#shared/records/sheet-bundle'
import type { Worker } from '#shared/records/worker'
import type { PickerOption } from '~/components/field/FieldPicker.vue'
import type { Reference } from '~/composables/useReference'
import { accuracyText, boundsText, calibratorText, methodFlowText, methodVolumeText, pumpText } from './field-text'
import { formatDay } from './format'
import type { NameOf } from './record-names'
import { SOURCE_STATUS_WORDS } from './record-words'

// What the pickers of the field offer, each with what tells it apart and what is wrong with it.

export function workerOptions(workers: readonly Identified<Worker>[]): PickerOption[] {
  return workers.map(worker => ({ value: worker.id, label: worker.code, detail: worker.jobTitle || undefined }))
}

export function agentOptions(agents: readonly Identified<Agent>[]): PickerOption[] {
  return agents.map(agent => ({ value: agent.id, label: agent.name, detail: agent.cas ? `CAS ${agent.cas}` : undefined }))
}

export function methodOptions(methods: readonly Identified<Method>[]): PickerOption[] {
  return methods.map(method => ({
    value: method.id,
    label: `${method.code} ${method.title}`.trim(),
    detail: methodDetail(method),
    search: method.analytes,
  }))
}

/** A method's ranges with how far they can be trusted; a missing range is said, never passed over. */
export function methodDetail(method: Method): string {
  return [
    methodFlowText(method) ?? 'no flow range stored',
    methodVolumeText(method) ?? 'no volume range stored',
    method.medium,
  ].filter(Boolean).join(' · ')
}

export function methodSourceText(method: Method): string {
  return `${method.source || 'Source not stored'}. ${SOURCE_STATUS_WORDS[method.status]}.`
}

export function samplerOptions(samplers: readonly Identified<Sampler>[]): PickerOption[] {
  return samplers.map(sampler => ({
    value: sampler.id,
    label: sampler.name,
    detail: [sampler.fraction, sampler.designFlowLitresPerMinute ? `designed for ${sampler.designFlowLitresPerMinute} L/min` : ''].filter(Boolean).join(' · ') || undefined,
  }))
}

/**
 * @param pumps all pumps on the phone
 * @param inUse which sheet each busy pump runs on, by pump
 */
export function pumpOptions(pumps: readonly Identified<Pump>[], inUse: ReadonlyMap<string, string> = new Map()): PickerOption[] {
  return pumps.map((pump) => {
    const where = inUse.get(pump.id)
    return {
      value: pump.id,
      label: pumpText(pump),
      detail: `${boundsText(pump.flowMinimumLitresPerMinute, pump.flowMaximumLitresPerMinute, 'L/min')} · indicator ${accuracyText(pump.accuracy)}`,
      ...(where && { tone: 'attention' as const, toneWord: `running on ${where}` }),
    }
  })
}

export function calibratorOptions(calibrators: readonly Identified<Calibrator>[], todayOn: string): PickerOption[] {
  return calibrators.map((calibrator) => {
    const due = calibrator.dueOn
    const isOverdue = due !== null && !isCalibratorInDate(due, todayOn)
    return {
      value: calibrator.id,
      label: calibratorText(calibrator),
      detail: due ? `certificate due ${formatDay(due)}` : undefined,
      ...(isOverdue && { tone: 'attention' as const, toneWord: 'certificate overdue' }),
      ...(due === null && { tone: 'attention' as const, toneWord: 'no certificate date stored' }),
    }
  })
}

/** Names of everything that a sheet points to, from the lists on this phone; a short form of the identity where nothing is known of it. */
export function referenceNames(reference: Reference): NameOf {
  const names = new Map<string, string>()
  for (const one of reference.people) names.set(one.id, one.name)
  for (const one of reference.workers) names.set(one.id, one.code)
  for (const one of reference.pumps) names.set(one.id, pumpText(one))
  for (const one of reference.calibrators) names.set(one.id, calibratorText(one))
  for (const one of [...reference.samplers, ...reference.agents, ...reference.exposureGroups]) names.set(one.id, one.name)
  for (const one of reference.methods) names.set(one.id, one.code)
  for (const one of reference.surveys) names.set(one.id, one.title)
  return id => names.get(id) ?? `unknown (${id.slice(0, 8)})`
}

/** Each value once, in the order given, without what is not there. */
export function eachOnce<T>(values: readonly (T | null | undefined)[]): T[] {
  return [...new Set(values.filter((value): value is T => value !== null && value !== undefined))]
}
