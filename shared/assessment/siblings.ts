import type { SheetDocument, Sibling } from '#shared/records/sheet-bundle'
import { placeEvents } from './placed-events'
import { runTimeline, type RunTimeline } from './run-timeline'
import { airOf } from './sample-kind'
import { drawnSpans } from './spans'

/**
 * What one sheet tells the others of its survey.
 *
 * @param document the sheet
 * @param timeline its run, when that is known already
 */
export function siblingOf(document: SheetDocument, timeline: RunTimeline = runTimeline(placeEvents(document.events), document.sheet.pumpId)): Sibling {
  const { sheet } = document
  return {
    id: document.id,
    number: sheet.number, kind: sheet.kind, workerId: sheet.workerId, agentIds: sheet.agentIds, methodId: sheet.methodId,
    mediumLot: sheet.mediumLot, sharesPump: sheet.sharesPump, state: document.standing.state,
    spans: airOf(sheet) === 'none' ? [] : drawnSpans(timeline),
  }
}

/** Every sheet of a survey as the others see it. A sheet that was put away no longer counts. */
export function siblingsOf(documents: readonly SheetDocument[]): Sibling[] {
  return documents.filter(document => !document.sheet.archived).map(document => siblingOf(document))
}
