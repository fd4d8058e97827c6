import { readNumber } from '#shared/domain/number-text'
import { litresPerMinute, type FlowUnit } from '#shared/domain/units'
import type { NumberReading } from '#shared/domain/number-text'
import { NUMBER_COMPLAINTS, flowNumber } from './field-text'

/** Beyond this no sampling pump moves air; the record refuses it too. */
const IMPOSSIBLE_LITRES_PER_MINUTE = 1000

export interface FlowEntry {
  reading: NumberReading
  /** The flow, or null when nothing that can be kept was typed. */
  litresPerMinute: number | null
  /** What is wrong with it, in words; '' when nothing is or nothing was typed. */
  complaint: string
  /** What it is read as, with its unit. */
  echo: string
}

/** What a typed flow means: read once, for the pad and for the check. */
export function readFlow(typed: string, unit: FlowUnit): FlowEntry {
  const reading = readNumber(typed)
  if (!reading.ok) return { reading, litresPerMinute: null, complaint: NUMBER_COMPLAINTS[reading.reason], echo: '' }
  if (reading.value <= 0) return { reading, litresPerMinute: null, complaint: 'A flow is above 0.', echo: '' }
  const flow = litresPerMinute(reading.value, unit)
  if (flow > IMPOSSIBLE_LITRES_PER_MINUTE) {
    return { reading, litresPerMinute: null, complaint: unit === 'L/min' ? 'No sampling pump moves that much. Is it mL/min?' : 'No sampling pump moves that much.', echo: '' }
  }
  const asTyped = `= ${reading.value.toFixed(Math.min(reading.decimals, 20))} ${unit}`
  return { reading, litresPerMinute: flow, complaint: '', echo: unit === 'mL/min' ? `${asTyped} = ${flowNumber(flow)} L/min` : asTyped }
}
