/** The value below which `share` of the figures lie, by the nearest rank. */
export function quantile(figures: readonly number[], share: number): number {
  const sorted = [...figures].sort((one, other) => one - other)
  return sorted[Math.min(sorted.length - 1, Math.max(0, Math.ceil(share * sorted.length) - 1))] ?? Number.NaN
}

export interface Line { what: string, goal: string, measured: string, beside: string }

/** Prints lines under each other, so that they can be read and pasted. */
export function printTable(lines: readonly Line[]): void {
  const rows = [{ what: 'what', goal: 'goal', measured: 'measured', beside: 'beside it, in the same run' }, ...lines]
  const width = (key: keyof Line) => Math.max(...rows.map(row => row[key].length))
  for (const row of rows) console.log(`| ${row.what.padEnd(width('what'))} | ${row.goal.padEnd(width('goal'))} | ${row.measured.padEnd(width('measured'))} | ${row.beside} |`)
}

export const ms = (value: number) => `${value < 100 ? value.toFixed(1) : value.toFixed(0)} ms`
export const kib = (bytes: number) => `${(bytes / 1024).toFixed(1)} KiB`
