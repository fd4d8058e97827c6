import { dayAt } from '../place-time'
import type { SheetFacts } from '../sheet-facts'

/** The day of the sample where it was taken: of its start, else today. */
export function samplingDay({ timeline, now, zone }: SheetFacts): string {
  return dayAt(timeline.startedAt ?? now, zone)
}
