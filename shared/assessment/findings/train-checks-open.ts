import type { Sheet } from '#shared/records/sheet'
import type { FindingRule } from './finding-rule'

const CHECKS = {
  checkEndsBroken: 'ends broken', checkPlugOut: 'plugs out', checkArrow: 'arrow towards the pump', checkCycloneUpright: 'cyclone upright', checkLeak: 'leak check',
} satisfies Partial<Record<keyof Sheet, string>>

/** Looks at the train that nobody ticked or put aside. */
export const trainChecksOpen: FindingRule = {
  code: 'train-checks-open',
  find({ sheet, air, timeline }) {
    if (air !== 'pumped' || timeline.state === 'not-started') return null
    const open = Object.entries(CHECKS).filter(([field]) => sheet[field as keyof typeof CHECKS] === null).map(([, words]) => words)
    if (open.length === 0) return null
    return {
      severity: 'note', part: 'set-up',
      title: `Not answered at the train: ${open.join(', ')}.`,
      whatNow: 'Look at the train and tick each, or say that it does not apply.',
      numbers: [{ name: 'open checks', value: open.length, unit: '' }],
      rule: 'Ends, plugs, direction, cyclone and leaks are looked at before the start.',
      source: 'common practice; NIOSH Manual of Analytical Methods, methods 7501 and 0600, for the cyclone',
    }
  },
}
