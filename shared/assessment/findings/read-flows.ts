import type { FlowSummary } from '../sheet-assessment'
import type { SheetFacts } from '../sheet-facts'

export interface ReadFlow {
  pumpId: string
  when: 'before' | 'after'
  summary: FlowSummary
  /** As read, or at the conditions of sampling for a rotameter whose conditions are known. */
  litresPerMinute: number
  /** Subject of a finding about this set of readings. */
  subject: string
  part: 'flow-before' | 'flow-after'
}

/** Every set of readings on the sheet: each pump's before and after. */
export function readFlows(facts: SheetFacts): ReadFlow[] {
  return [...facts.flows.values()].flatMap(flows => [
    ...setOf('before', flows.before, flows.beforeLitresPerMinute),
    ...setOf('after', flows.after, flows.afterLitresPerMinute),
  ])
}

function setOf(when: ReadFlow['when'], summary: FlowSummary | null, litresPerMinute: number | null): ReadFlow[] {
  if (!summary || litresPerMinute === null) return []
  return [{ pumpId: summary.pumpId, when, summary, litresPerMinute, subject: `${summary.pumpId}/${when}`, part: when === 'before' ? 'flow-before' : 'flow-after' }]
}

/** Whether a flow lies outside two bounds; on a bound is inside, and arithmetic dust does not count. */
export function isOutside(value: number, minimum: number | null, maximum: number | null): boolean {
  return (minimum !== null && minimum - value > 1e-9 * minimum) || (maximum !== null && value - maximum > 1e-9 * maximum)
}
