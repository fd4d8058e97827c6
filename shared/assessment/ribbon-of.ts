import { instantText } from '#shared/domain/instant'
import type { RibbonInput } from './ribbon'
import type { SheetAssessment } from './sheet-assessment'
import type { SheetFacts } from './sheet-facts'
import { shiftOf } from './shift-share'

/** What the ribbon of a sheet is drawn from. */
export function ribbonOf(facts: SheetFacts, pauses: SheetAssessment['pauses']): RibbonInput {
  const checks = facts.events.of('flow-check')
  return {
    shift: shiftOf(facts.sheet),
    nowAt: facts.nowAt,
    spans: facts.spans,
    pauses,
    checks: facts.air === 'pumped' ? checks.map(({ at }, place) => ({ at: instantText(at), verdict: facts.checks[place]?.verdict ?? 'within' })) : [],
    faults: facts.events.of('pump-fault').map(({ at }) => ({ at: instantText(at) })),
    plannedEndAt: facts.plannedEndAt,
    minimumAt: facts.projection?.minimumAt ?? null,
    maximumAt: facts.projection?.maximumAt ?? null,
    activities: facts.events.of('activity').map(({ event }) => ({ fromAt: event.data.fromAt, toAt: event.data.toAt, label: event.data.text })),
  }
}
