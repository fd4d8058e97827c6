import { isSample } from '../sample-kind'
import type { FindingRule } from './finding-rule'
import { numberKey, COMMON_PRACTICE } from './words'

/** There are blanks, but none of this sample's lot. No blanks at all is a finding of its own. */
export const lotWithoutBlanks: FindingRule = {
  code: 'lot-without-blanks',
  find({ sheet, bundle: { siblings }, timeline }) {
    const lot = sheet.mediumLot
    if (!isSample(sheet.kind) || timeline.state !== 'stopped' || !lot?.trim()) return null
    const blanks = siblings.filter(sibling => sibling.kind === 'field-blank' && sibling.methodId === sheet.methodId && sibling.state !== 'void')
    if (blanks.length === 0 || blanks.some(blank => blank.mediumLot !== null && numberKey(blank.mediumLot) === numberKey(lot))) return null
    return {
      severity: 'attention', part: 'close',
      title: `No field blank is of lot ${lot}.`,
      whatNow: 'Open and cap a blank of this lot, correct the lot that was noted wrong, or give the reason.',
      numbers: [
        { name: 'lot of the sample', value: lot, unit: '' },
        { name: 'lots of the blanks', value: [...new Set(blanks.map(blank => blank.mediumLot ?? 'not noted'))].join(', '), unit: '' },
      ],
      rule: 'Field blanks are of the same lot as the samples.',
      source: COMMON_PRACTICE,
    }
  },
}
