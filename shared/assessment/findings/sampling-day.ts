import { instantText } from '#shared/domain/instant'
import { localParts } from '#shared/domain/local-time'
import type { SheetFacts } from '../sheet-facts'

/** The day of the sample where it was taken: of its start, else today. */
export function samplingDay({ timeline, now, zone }: SheetFacts): string {
  return localParts(instantText(timeline.startedAt ?? now), zone).dayOn
}
