import type { FindingRule } from './finding-rule'

/** A diffusive sampler without its uptake rate has minutes and no volume. */
export const uptakeMissing: FindingRule = {
  code: 'uptake-missing',
  find({ air, sheet, timeline, sampledMinutes }) {
    if (air !== 'diffusive' || sheet.uptakeMillilitresPerMinute !== null || timeline.state === 'not-started') return null
    return {
      severity: 'attention', part: 'set-up',
      title: 'The uptake rate of the sampler is missing, so there is no volume.',
      whatNow: 'Enter the uptake rate for this substance from the sampler\'s papers, or say who will give it.',
      numbers: [{ name: 'minutes of exposure', value: sampledMinutes ?? 0, unit: 'min' }],
      rule: 'Volume of a diffusive sampler = uptake rate × minutes of exposure.',
      source: 'definition of the uptake rate; EN ISO 23320:2022, from memory',
    }
  },
}
