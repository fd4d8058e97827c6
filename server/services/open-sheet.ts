import type { Actor } from '#shared/access/policy'
import type { SheetAnswer } from '#shared/records/office-views'
import type { Row } from '#shared/sync/rows'
import type { Transaction } from '#server/database/client'
import { organisationVersion } from '#server/database/queries/organisation-version'
import { peopleNames } from '#server/database/queries/people-names'
import { phonesOf } from '#server/database/queries/phones'
import { sheetHistory } from '#server/database/queries/sheet-history'
import { namedRecordRows, surveyRowsFor } from '#server/database/queries/sheet-rows'
import { sheetStanding } from '#server/database/queries/sheet-standing'
import { OFFICE_DEVICE } from './apply-office'
import { Refusal } from './refusal'

/**
 * One sheet for the office: its rows and those of everything its assessment looks at, names, and its history.
 *
 * @throws Refusal `not-found` when the organisation has no such sheet
 */
export async function openSheet(tx: Transaction, actor: Actor, sheetId: string): Promise<SheetAnswer> {
  const organisation = actor.organisationId
  const standing = await sheetStanding(tx, organisation, sheetId)
  if (!standing) throw new Refusal('not-found', 404)
  const { ver } = await organisationVersion(tx, organisation)
  const surveyRows = await surveyRowsFor(tx, organisation, sheetId, standing.survey)
  // The survey names its site and crew, the sheet everything else; siblings only tell what they are.
  const named = idsIn(surveyRows.filter(row => row.object === sheetId || row.object === standing.survey))
  const known = new Set(surveyRows.map(row => row.object))
  const recordRows = await namedRecordRows(tx, organisation, [...named].filter(id => !known.has(id)))
  const history = await sheetHistory(tx, organisation, sheetId)

  const mentioned = new Set([...named, ...history.map(entry => entry.author)])
  const people = Object.fromEntries([...await peopleNames(tx, organisation)].filter(([id]) => mentioned.has(id)))
  const devs = new Set(history.map(entry => entry.dev))
  const phones = (await phonesOf(tx, organisation)).filter(phone => devs.has(phone.dev)).map(phone => [phone.dev, phone.label] as const)
  return { sheetId, ver, rows: [...surveyRows, ...recordRows], people, phones: { ...Object.fromEntries(phones), [OFFICE_DEVICE]: 'Office' }, history }
}

const ID = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/i

/** Every id that the rows name, wherever it stands in them. */
function idsIn(rows: readonly Row[]): Set<string> {
  const ids = new Set<string>()
  const look = (value: unknown): void => {
    if (typeof value === 'string') {
      if (ID.test(value)) ids.add(value)
    }
    else if (value !== null && typeof value === 'object') Object.values(value).forEach(look)
  }
  for (const row of rows) look(row.data)
  return ids
}
