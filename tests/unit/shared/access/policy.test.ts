import { describe, expect, it } from 'vitest'
import { can, type Actor } from '#shared/access/policy'
import type { Role } from '#shared/records/person'
import { SHEET_STATES, TRANSITION_TABLE, TRANSITIONS } from '#shared/records/sheet-state'

const actor = (...roles: Role[]): Actor => ({ id: 'a', organisationId: 'o', roles })

describe('can', () => {
  it('lets a technician hand in only what is open or returned, and only in the crew', () => {
    for (const state of SHEET_STATES) {
      expect(can(actor('technician'), { do: 'step', transition: 'hand-in' }, { state, isInCrew: true })).toBe(['open', 'returned'].includes(state))
      expect(can(actor('technician'), { do: 'step', transition: 'hand-in' }, { state, isInCrew: false })).toBe(false)
    }
  })

  it('leaves every other step to the reviewer, as the table of steps says', () => {
    for (const transition of TRANSITIONS) {
      for (const state of SHEET_STATES) {
        const allowed = TRANSITION_TABLE[transition].from.includes(state)
        expect(can(actor('reviewer'), { do: 'step', transition }, { state })).toBe(allowed)
        if (transition !== 'hand-in') expect(can(actor('technician', 'administrator'), { do: 'step', transition }, { state, isInCrew: true })).toBe(false)
      }
    }
  })

  it('keeps equipment, surveys and plans for the office, people and settings for the administrator', () => {
    for (const kind of ['pump', 'survey', 'plan-line', 'method', 'limit'] as const) {
      expect(can(actor('technician'), { do: 'change', kind }, { isInCrew: true })).toBe(false)
      expect(can(actor('reviewer'), { do: 'change', kind })).toBe(true)
    }
    for (const kind of ['person', 'settings'] as const) {
      expect(can(actor('reviewer', 'technician'), { do: 'change', kind })).toBe(false)
      expect(can(actor('administrator'), { do: 'change', kind })).toBe(true)
    }
  })

  it('gives nothing to somebody without a role', () => {
    expect(can(actor(), { do: 'see-office' })).toBe(false)
    expect(can(actor(), { do: 'change', kind: 'sheet' }, { isInCrew: true })).toBe(false)
  })
})
