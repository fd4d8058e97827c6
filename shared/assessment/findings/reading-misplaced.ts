import type { FindingRule } from './finding-rule'
import { COMMON_PRACTICE, timeText } from './words'
import { readFlows } from './read-flows'

/** A flow "before" that was read after the pump began to draw, or a flow "after" that was read before it ended. */
export const readingMisplaced: FindingRule = {
  code: 'reading-misplaced',
  find(facts) {
    const placedAt = new Map(facts.events.of('flow-reading').map(({ event, at }) => [event.id, at]))
    return readFlows(facts).flatMap(({ summary, when, subject, part, pumpId }) => {
      const stretches = facts.timeline.stretches.filter(stretch => stretch.pumpId === pumpId)
      const from = stretches[0]?.from
      const to = stretches.at(-1)?.to ?? Infinity
      if (from === undefined) return []
      const wrong = summary.readings.filter((reading) => {
        const at = placedAt.get(reading.id) ?? (when === 'before' ? -Infinity : Infinity)
        return when === 'before' ? at > from : at < to
      })
      const first = wrong[0]
      if (!first) return []
      return [{
        severity: 'attention', part, subject,
        title: when === 'before'
          ? `Flow before${facts.ofPump(pumpId)} was read at ${timeText(placedAt.get(first.id)!, facts.zone)}, after the pump began to draw at ${timeText(from, facts.zone)}.`
          : `Flow after${facts.ofPump(pumpId)} was read at ${timeText(placedAt.get(first.id)!, facts.zone)}, before the pump ended.`,
        whatNow: 'Correct the time of the reading or of the timer, or give the reason.',
        numbers: [{ name: 'readings out of place', value: wrong.length, unit: '' }],
        rule: 'Flow before is read before the pump draws air, flow after when it has ended.',
        source: COMMON_PRACTICE,
      }]
    })
  },
}
