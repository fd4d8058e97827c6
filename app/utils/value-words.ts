import { isInstant } from '#shared/domain/instant'
import { isDay } from '#shared/domain/day'
import type { SheetField } from '#shared/records/sheet'
import { formatDay, formatInstant } from './format'
import type { NameOf } from './record-names'
import { AIR_WORDS, CHECK_WORDS, INLET_SIDE_WORDS, SHEET_KIND_WORDS, USUAL_DAY_WORDS } from './record-words'

const CHOICES: Readonly<Partial<Record<SheetField, Readonly<Record<string, string>>>>> = {
  kind: SHEET_KIND_WORDS,
  air: AIR_WORDS,
  usualDay: USUAL_DAY_WORDS,
  inletSide: INLET_SIDE_WORDS,
  checkEndsBroken: CHECK_WORDS,
  checkPlugOut: CHECK_WORDS,
  checkArrow: CHECK_WORDS,
  checkCycloneUpright: CHECK_WORDS,
  checkLeak: CHECK_WORDS,
}

/** The value of a sheet's field in words: names for identities, the place's time for instants, units for measures. */
export function valueInWords(field: string, value: unknown, nameOf: NameOf, zone: string): string {
  if (value === null || value === undefined || value === '') return 'empty'
  if (typeof value === 'boolean') return value ? 'yes' : 'no'
  if (typeof value === 'number') return numberInWords(field, value)
  if (Array.isArray(value)) return value.length === 0 ? 'none' : value.map(item => valueInWords(field, item, nameOf, zone)).join(', ')
  if (typeof value !== 'string') return JSON.stringify(value)
  const choice = CHOICES[field as SheetField]?.[value]
  if (choice) return choice
  if (/Ids?$/.test(field)) return nameOf(value)
  if (isInstant(value)) return formatInstant(value, zone)
  if (isDay(value)) return formatDay(value)
  return value
}

function numberInWords(field: string, value: number): string {
  if (field === 'plannedFlowLitresPerMinute') return `${value} L/min`
  if (field === 'uptakeMillilitresPerMinute') return `${value} mL/min`
  return String(value)
}
