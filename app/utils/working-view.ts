import type { Working } from '#shared/domain/working'
import { formatQuantity, withLocalTimes } from './format'

/** The props of `UiWorking`. */
export interface WorkingView {
  name: string
  formula: string
  inputs: { label: string, value: string, unit?: string }[]
  result: { value: string, unit?: string }
  source: string
  note?: string
}

/** A working as `UiWorking` shows it: numbers rounded for eyes, instants in the zone of the place. */
export function workingView(working: Working, zone: string): WorkingView {
  return {
    name: working.title,
    formula: working.formula,
    inputs: working.inputs.map((input) => {
      const from = input.from ? ` (${withLocalTimes(input.from, zone)})` : ''
      return { label: `${input.name}${from}`, ...shown(input.value, input.unit, zone) }
    }),
    result: shown(working.result.value, working.result.unit, zone),
    source: working.source,
    note: working.note ? withLocalTimes(working.note, zone) : undefined,
  }
}

function shown(value: number | string, unit: string, zone: string): { value: string, unit?: string } {
  const measure = formatQuantity(value, unit, zone)
  return { value: measure.value, unit: measure.unit || undefined }
}
