import { fixed, significant } from '#shared/domain/rounding'
import { timeAt } from '../place-time'

/** Where rules come from, said the same way in every finding. */
export const COMMON_PRACTICE = 'common practice'
export const SETTINGS_RULE = 'common practice; the threshold is a setting of the organisation'
export const HOUSE_RULE = 'house rule'
export const NMAM_D = 'NIOSH Manual of Analytical Methods, chapter D'

export const flowText = (litresPerMinute: number) => `${significant(litresPerMinute, 3)} L/min`
export const litresText = (litres: number) => `${significant(litres, 3)} L`
export const percentText = (percent: number) => `${fixed(Math.abs(percent), 1)} %`
export const minutesText = (minutes: number) => `${fixed(minutes, 0)} min`

/** Clock time on the wall of the place. */
export const timeText = timeAt

/** "above" or "below", by sign. */
export const sideText = (value: number) => value < 0 ? 'below' : 'above'

export const sameNumber = (a: string | null, b: string | null) => a !== null && b !== null && numberKey(a) !== '' && numberKey(a) === numberKey(b)

/** Numbers are compared as people read them: without regard to capitals and spaces. */
export function numberKey(number: string): string {
  return number.toLowerCase().replace(/\s+/g, '')
}
