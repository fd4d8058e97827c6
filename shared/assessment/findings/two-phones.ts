import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** More than one phone wrote on the sheet. */
export const twoPhones: FindingRule = {
  code: 'two-phones',
  find({ events, bundle: { document } }) {
    const phones = new Set([...events.phones, ...Object.values(document.origins).flatMap(origin => origin?.dev ?? [])])
    if (phones.size < 2) return null
    return {
      severity: 'note', part: 'close',
      title: `${phones.size} phones wrote on this sheet.`,
      whatNow: 'Nothing to do. Look at the times where one took over from the other.',
      numbers: [{ name: 'phones', value: phones.size, unit: '' }],
      rule: 'With several phones, each time is moved onto the server\'s clock by what is known of that phone, for order and differences only.',
      source: HOUSE_RULE,
    }
  },
}
