import type { VolumeRange } from '../volume-range'
import type { Found } from './finding-rule'

/** The numbers every finding about a volume shows. */
export function volumeNumbers(name: string, litres: number, range: VolumeRange): Found['numbers'] {
  const bound = (value: number | null) => value === null ? { value: 'not stored', unit: '' } : { value, unit: 'L' }
  return [
    { name, value: litres, unit: 'L' },
    { name: 'minimum volume', ...bound(range.minimumLitres) },
    { name: 'maximum volume', ...bound(range.maximumLitres) },
    { name: 'range from', value: range.from, unit: '' },
  ]
}

export const isUnder = (litres: number, bound: number | null): bound is number => bound !== null && bound - litres > 1e-9 * bound
export const isOver = (litres: number, bound: number | null): bound is number => bound !== null && litres - bound > 1e-9 * bound
