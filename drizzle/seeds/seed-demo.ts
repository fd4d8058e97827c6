import { eq } from 'drizzle-orm'
import type { Actor } from '#shared/access/policy'
import type { Role } from '#shared/records/person'
import { formatHlc } from '#shared/sync/hlc'
import { SCHEMA_VERSION } from '#shared/sync/operations'
import { PROTOCOL_VERSION, type PushRequest } from '#shared/sync/protocol'
import type { Database } from '#server/database/client'
import { organisations } from '#server/database/tables/organisations'
import { inOrganisation } from '#server/database/with-organisation'
import { applyOffice } from '#server/services/apply-office'
import { applyPush } from '#server/services/apply-push'
import { createOrganisation, createUser } from '#server/services/create-organisation'
import { DEMO_ORGANISATION, DEMO_ZONE, demoIds, demoOrganisationDrafts } from './demo-organisation'
import { demoSheets } from './demo-sheets'
import { namedId } from './ids'
import { referenceDrafts } from './reference'
import type { SeedPhone } from './seed-phone'
import signIns from './demo-sign-ins.json'

/**
 * Makes the demo organisation through the program's own doors: office changes as the office makes them, sheets pushed as
 * phones push them, decisions as the reviewer takes them.
 *
 * @param now the scenario lies around this instant
 * @param name of the organisation; another name makes another one, with its own ids and its own addresses for signing in
 * @returns false when it was there already
 */
export async function seedDemo(database: Database, now: Date, name = DEMO_ORGANISATION, mailDomain?: string): Promise<boolean> {
  const organisationId = namedId('lapel', 'organisation', name)
  const ids = demoIds(organisationId)
  const people = signIns.map(person => ({
    ...person, id: ids.person(person.email), roles: [person.role] as Role[],
    email: mailDomain ? person.email.replace(/@.*$/, `@${mailDomain}`) : person.email,
  }))
  const actorOf = (person: (typeof people)[number]): Actor => ({ id: person.id, organisationId, roles: person.roles })
  const reviewer = actorOf(people.find(person => person.role === 'reviewer')!)
  // Set-up needs both rights; nobody holds them in the demo, the seed does.
  const office: Actor = { ...reviewer, roles: ['reviewer', 'administrator'] }

  return inOrganisation(database, organisationId, async (tx) => {
    const there = await tx.select({ id: organisations.id }).from(organisations).where(eq(organisations.id, organisationId))
    if (there.length > 0) return false
    await createOrganisation(tx, { id: organisationId, name }, now)
    for (const person of people) await createUser(tx, { ...person, organisationId }, now)
    refuseFaults((await applyOffice(tx, office, [...referenceDrafts(organisationId, now.toISOString()), ...demoOrganisationDrafts(organisationId, now)], now)).answers)

    const { phones, decisions } = demoSheets(organisationId, now)
    for (const phone of phones) {
      const actor = actorOf(people.find(person => person.id === phone.personId)!)
      refuseFaults((await applyPush(tx, actor, pushOf(phone, now), now)).res.map(([, outcome, reason]) => ({ outcome, reason })))
    }
    const revisions = new Map<string, number>()
    for (const decision of decisions) {
      const revision = revisions.get(decision.sheetId) ?? 1
      revisions.set(decision.sheetId, revision + 1)
      refuseFaults((await applyOffice(tx, reviewer, [{
        kind: 'st.req', object: decision.sheetId, sheet: decision.sheetId, at: decision.at, zone: DEMO_ZONE,
        body: { transition: decision.transition, expect: revision, fit: decision.fit, reason: decision.reason },
      }], now)).answers)
    }
    return true
  })
}

/** What the phone would have sent: its own numbers, stamps by its own clock. */
function pushOf(phone: SeedPhone, now: Date): PushRequest {
  return {
    v: PROTOCOL_VERSION, dev: phone.dev, phone: phone.dev.replace('d_', 'p_'), label: phone.label, epoch: null, sv: SCHEMA_VERSION,
    pending: phone.drafts.length, oldest: null, blobs: 0, cursor: 0, now: now.toISOString(),
    ops: phone.drafts.map((draft, index) => ({
      id: draft.id ?? namedId(phone.organisationId, 'operation', phone.dev, String(index)),
      n: index + 1, hlc: formatHlc(Date.parse(draft.at), index % 0x10000), sv: SCHEMA_VERSION,
      kind: draft.kind, object: draft.object, sheet: draft.sheet, at: draft.at, enteredAt: draft.at, zone: DEMO_ZONE,
      mono: null, offset: 0, by: draft.by ?? null, personal: draft.personal ?? null, body: draft.body,
    })),
  }
}

/** A seed that is not taken whole is a fault of the seed. */
function refuseFaults(answers: readonly { outcome: string, reason: string | null, detail?: string | null }[]): void {
  const bad = answers.map((answer, index) => ({ ...answer, index })).filter(answer => answer.outcome !== 'ok')
  if (bad.length > 0) throw new Error(`seed: ${bad.length} operations were not applied: ${JSON.stringify(bad.slice(0, 5))}`)
}
