import { shiftCoverage, type ShiftCoverage } from '#shared/domain/coverage'
import type { Span } from '#shared/domain/duration'
import type { Sheet } from '#shared/records/sheet'
import type { Sibling } from '#shared/records/sheet-bundle'
import { isSample } from './sample-kind'
import type { SheetAssessment } from './sheet-assessment'

export interface ShiftShare { shift: Span, spans: Span[], coverage: ShiftCoverage, otherSheets: number }

/** The planned shift, when both its ends are noted and in order. */
export function shiftOf(sheet: Pick<Sheet, 'shiftStartsAt' | 'shiftEndsAt'>): Span | null {
  const { shiftStartsAt, shiftEndsAt } = sheet
  if (shiftStartsAt === null || shiftEndsAt === null || !(Date.parse(shiftEndsAt) > Date.parse(shiftStartsAt))) return null
  return { fromAt: shiftStartsAt, toAt: shiftEndsAt }
}

/**
 * The share of the shift in which air was drawn for this worker and agent: by this sheet and by the others that go with it
 * (the same worker, an agent in common, not void), each minute once.
 *
 * @param sheet the sheet; null comes back when its shift is not noted
 * @param spans its own spans
 * @param siblings the other sheets of the survey
 * @param nowAt end of an open span
 */
export function shiftShare(sheet: Sheet, spans: SheetAssessment['spans'], siblings: readonly Sibling[], nowAt: string): ShiftShare | null {
  const shift = shiftOf(sheet)
  if (!shift) return null
  const others = sheet.workerId === null ? [] : siblings.filter(sibling => goesWith(sheet, sibling))
  const all = [...spans, ...others.flatMap(sibling => sibling.spans)].map(span => closed(span, nowAt))
  return { shift, spans: all, coverage: shiftCoverage(shift, all), otherSheets: others.length }
}

function goesWith(sheet: Sheet, sibling: Sibling): boolean {
  return sibling.workerId === sheet.workerId && sibling.state !== 'void' && isSample(sibling.kind) && sibling.spans.length > 0
    && sibling.agentIds.some(id => sheet.agentIds.includes(id))
}

function closed(span: { fromAt: string, toAt: string | null }, nowAt: string): Span {
  if (span.toAt !== null) return { fromAt: span.fromAt, toAt: span.toAt }
  return { fromAt: span.fromAt, toAt: Date.parse(nowAt) > Date.parse(span.fromAt) ? nowAt : span.fromAt }
}
