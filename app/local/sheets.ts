import { isOpenForField } from '#shared/access/policy'
import { assessSheet } from '#shared/assessment/assess-sheet'
import { siblingsOf } from '#shared/assessment/siblings'
import type { SheetAssessment } from '#shared/assessment/sheet-assessment'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import { createBundleSource, type BundleSource } from '#shared/sync/bundle'
import { kindOf, type ObjectRows } from '#shared/sync/read-rows'
import type { FieldView } from './view'

/** The sheets of a view, each with what the assessment says of it. */
export interface SheetsOnPhone {
  groups: FieldView['groups']
  source: BundleSource
  sheetIds: readonly string[]
  bundle: (sheetId: string) => SheetBundle | null
  /** @param nowAt the instant it is looked at; within one minute the answer of before is given again when nothing changed */
  assess: (sheetId: string, nowAt: string) => SheetAssessment | null
}

interface Kept { rows: ObjectRows, reference: number, survey: string, bundle: SheetBundle, assessedAt: string, assessment: SheetAssessment | null }

const MINUTE_CHARACTERS = '2026-12-01T08:30'.length

/**
 * Turns views into sheets and keeps what cannot have changed: a sheet is read and assessed again only when its own rows,
 * the reference records or what its siblings tell it did change, so a reading on one of forty sheets costs that one.
 */
export function createSheetsReader(): (view: FieldView) => SheetsOnPhone {
  const kept = new Map<string, Kept>()
  let reference = 0
  let referenceRows = new Map<string, ObjectRows>()

  return ({ groups }) => {
    const nextReference = new Map<string, ObjectRows>()
    const sheetIds: string[] = []
    for (const [id, rows] of groups) {
      if (kindOf(rows) === 'sheet') sheetIds.push(id)
      else nextReference.set(id, rows)
    }
    if (!isSameRows(referenceRows, nextReference)) reference += 1
    referenceRows = nextReference

    const surveyTexts = new Map<string, string>()
    const source = createBundleSource(groups, (documents) => {
      const siblings = siblingsOf(documents)
      if (documents[0]) surveyTexts.set(documents[0].surveyId, JSON.stringify(siblings))
      return siblings
    })

    function take(sheetId: string): Kept | null {
      const rows = groups.get(sheetId)
      const fresh = rows && source.bundle(sheetId)
      if (!rows || !fresh) return null
      const survey = surveyTexts.get(fresh.document.surveyId) ?? ''
      const known = kept.get(sheetId)
      if (known && known.rows === rows && known.reference === reference && known.survey === survey) return known
      const made: Kept = { rows, reference, survey, bundle: fresh, assessedAt: '', assessment: null }
      kept.set(sheetId, made)
      return made
    }

    return {
      groups,
      source,
      sheetIds,
      bundle: sheetId => take(sheetId)?.bundle ?? null,
      assess(sheetId, nowAt) {
        const entry = take(sheetId)
        if (!entry) return null
        const minute = nowAt.slice(0, MINUTE_CHARACTERS)
        // Time passes only for a sheet that is still in the field.
        const isStale = entry.assessedAt !== minute && isOpenForField(entry.bundle.document.standing.state)
        if (!entry.assessment || isStale) {
          entry.assessment = assessSheet(entry.bundle, nowAt)
          entry.assessedAt = minute
        }
        return entry.assessment
      },
    }
  }
}

function isSameRows(a: ReadonlyMap<string, ObjectRows>, b: ReadonlyMap<string, ObjectRows>): boolean {
  if (a.size !== b.size) return false
  for (const [id, rows] of b) if (a.get(id) !== rows) return false
  return true
}
