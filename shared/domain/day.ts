/**
 * Whether a text is a day of the calendar written YYYY-MM-DD. 30 February is not.
 *
 * @param text any text
 * @returns true for a day that exists
 * @source ISO 8601-1:2019, calendar date, extended format
 * @example isDay('2026-02-29') // false
 */
export function isDay(text: string): boolean {
  const parts = /^(\d{4})-(\d{2})-(\d{2})$/.exec(text)
  return parts !== null && dayExists(Number(parts[1]), Number(parts[2]), Number(parts[3]))
}

/**
 * Whether a day exists in the calendar.
 *
 * @param year year, 0 to 9999
 * @param month month, January is 1
 * @param day day of the month
 * @returns true for a day that exists
 * @source Gregorian calendar
 * @example dayExists(2028, 2, 29) // true
 */
export function dayExists(year: number, month: number, day: number): boolean {
  return month >= 1 && month <= 12 && day >= 1 && day <= daysInMonth(year, month)
}

function daysInMonth(year: number, month: number): number {
  if (month === 2) return isLeapYear(year) ? 29 : 28
  return [4, 6, 9, 11].includes(month) ? 30 : 31
}

function isLeapYear(year: number): boolean {
  return year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0)
}
