import { answerKey, answersOf } from '../finding-answers'
import { SEVERITIES, type Finding } from '../sheet-assessment'
import type { SheetFacts } from '../sheet-facts'
import type { FindingRule } from './finding-rule'

/** Every rule, in the order of the day. */
export const FINDING_RULES: readonly FindingRule[] = []

/** All that the rules find, the gravest first, each with the answer that was given to it. */
export function findAll(facts: SheetFacts): Finding[] {
  const answers = answersOf(facts.events.of('finding-answer'))
  const findings = FINDING_RULES.flatMap(({ code, find }) => [find(facts) ?? []].flat().map((found): Finding => {
    const subject = found.subject ?? ''
    return { ...found, code, subject, answer: answers.get(answerKey(code, subject)) ?? null }
  }))
  return findings.sort((a, b) => SEVERITIES.indexOf(b.severity) - SEVERITIES.indexOf(a.severity))
}
