import type { FindingRule } from './finding-rule'
import { isOver, volumeNumbers } from './volume-bound'
import { litresText } from './words'

/** More air than the medium is meant for: it may be overloaded or break through. */
export const volumeOverMaximum: FindingRule = {
  code: 'volume-over-maximum',
  find({ timeline, volumeLitres, range }) {
    if (volumeLitres === null || !isOver(volumeLitres, range.maximumLitres)) return null
    return {
      severity: 'attention', part: 'air',
      title: `${litresText(volumeLitres)} is over the maximum of ${litresText(range.maximumLitres)}.`,
      whatNow: timeline.state === 'stopped' ? 'Give the reason, and tell the laboratory to look for breakthrough or overload.' : 'Stop it now or change the medium.',
      numbers: volumeNumbers('volume', volumeLitres, range),
      rule: 'The volume stays within the maximum of the method.',
      source: range.from,
    }
  },
}
