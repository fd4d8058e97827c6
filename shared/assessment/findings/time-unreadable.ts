import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** An event whose time cannot be read: kept, shown, counted nowhere. */
export const timeUnreadable: FindingRule = {
  code: 'time-unreadable',
  find: ({ events }) => events.unreadable.map(event => ({
    severity: 'attention', part: 'air', subject: event.id,
    title: 'The time of an entry cannot be read; the entry does not count.',
    whatNow: 'Correct its time.',
    numbers: [{ name: 'time as written', value: event.at, unit: '' }],
    rule: 'Every entry has an instant.',
    source: HOUSE_RULE,
  })),
}
