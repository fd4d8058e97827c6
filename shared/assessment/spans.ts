import { instantText } from '#shared/domain/instant'
import type { RunTimeline } from './run-timeline'
import type { SheetAssessment } from './sheet-assessment'

/** Spans in which air was drawn, by pump; a reset of the flow does not cut them. The last is open while it runs. */
export function drawnSpans(timeline: RunTimeline): SheetAssessment['spans'] {
  const spans: { from: number, to: number | null, pumpId: string | null }[] = []
  for (const { from, to, pumpId } of timeline.stretches) {
    const last = spans.at(-1)
    if (last && last.pumpId === pumpId && last.to === from) last.to = to
    else spans.push({ from, to, pumpId })
  }
  return spans.map(({ from, to, pumpId }) => ({ fromAt: instantText(from), toAt: to === null ? null : instantText(to), pumpId }))
}
