import type { FindingRule } from './finding-rule'
import { isUnder, volumeNumbers } from './volume-bound'
import { litresText } from './words'

/** Stopped with less air than the method needs. */
export const volumeUnderMinimum: FindingRule = {
  code: 'volume-under-minimum',
  find({ timeline, volumeLitres, range }) {
    if (timeline.state !== 'stopped' || volumeLitres === null || !isUnder(volumeLitres, range.minimumLitres)) return null
    return {
      severity: 'attention', part: 'air',
      title: `${litresText(volumeLitres)} is under the minimum of ${litresText(range.minimumLitres)}.`,
      whatNow: 'Give the reason. The laboratory may find too little to measure; a second sample may be needed.',
      numbers: volumeNumbers('volume', volumeLitres, range),
      rule: 'The volume reaches the minimum of the method.',
      source: range.from,
    }
  },
}
