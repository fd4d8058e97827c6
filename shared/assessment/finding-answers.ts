import type { Placed } from './placed-events'
import type { Finding } from './sheet-assessment'

/** The answers that stand, by code and subject; of several the last. */
export function answersOf(answers: readonly Placed<'finding-answer'>[]): ReadonlyMap<string, NonNullable<Finding['answer']>> {
  return new Map(answers.map(({ event }) => [
    answerKey(event.data.code, event.data.subject),
    { reason: event.data.reason, author: event.author, at: event.at },
  ]))
}

export function answerKey(code: string, subject: string): string {
  return `${code} ${subject}`
}
