import fc from 'fast-check'
import { afterEach, describe, expect, it } from 'vitest'
import { canonicalJson } from '#shared/sync/same-value'
import { sheetDocumentOf } from '#shared/sync/read-rows'
import { commit, type OperationDraft } from '~/local/commit'
import { syncRound } from '~/local/sync-round'
import { createViewReader } from '~/local/view'
import { aContext, aPerson, aPhone, forget, newSheet, reading, setTask, TestServer, type Mishap, type TestPhone } from './phone'

const opened: TestPhone[] = []
afterEach(async () => { await forget(...opened.splice(0)) })

const SHEET = '00000000-0000-4000-8000-0000000000cc'

type Step = { do: 'set', value: string } | { do: 'read', flow: number } | { do: 'take-back' } | { do: 'hand-in' } | { do: 'clock', milliseconds: number } | { do: 'sync', mishaps: Mishap[] }

const step: fc.Arbitrary<Step> = fc.oneof(
  { weight: 4, arbitrary: fc.record({ do: fc.constant('set' as const), value: fc.constantFrom('sanding', 'grinding', 'welding') }) },
  { weight: 4, arbitrary: fc.record({ do: fc.constant('read' as const), flow: fc.double({ min: 0.5, max: 5, noNaN: true }) }) },
  { weight: 2, arbitrary: fc.constant({ do: 'take-back' as const }) },
  { weight: 1, arbitrary: fc.constant({ do: 'hand-in' as const }) },
  { weight: 1, arbitrary: fc.record({ do: fc.constant('clock' as const), milliseconds: fc.integer({ min: -3_600_000, max: 60_000 }) }) },
  { weight: 3, arbitrary: fc.record({ do: fc.constant('sync' as const), mishaps: fc.array(fc.constantFrom<Mishap>('none', 'no-network', 'reply-lost', 'timeout', 'broken', 'portal'), { maxLength: 2 }) }) },
)

async function documentOn(one: TestPhone) {
  const rows = (await createViewReader(one.store).read()).groups.get(SHEET)
  return rows ? sheetDocumentOf(rows) : null
}

/** What a person does with what is on their own screen. */
async function play(one: TestPhone, server: TestServer, given: Step): Promise<void> {
  const document = await documentOn(one)
  const write = (draft: OperationDraft) => commit(one.store, [draft])
  switch (given.do) {
    case 'clock':
      one.clock.milliseconds += given.milliseconds
      return
    case 'sync':
      server.mishaps = [...given.mishaps]
      await syncRound(aContext(one, server))
      server.mishaps = []
      return
    case 'set':
      if (document) await write(setTask(SHEET, given.value, document.origins.task?.opId ?? null))
      return
    case 'read':
      if (document) await write(reading(SHEET, given.flow))
      return
    case 'take-back': {
      const target = document?.events.findLast(event => event.void === null)
      if (target) await write({ kind: 'ev.void', object: SHEET, sheet: SHEET, body: { target: target.id, reason: 'Typed on the wrong sheet' } })
      return
    }
    case 'hand-in':
      if (document) await write({ kind: 'st.req', object: SHEET, sheet: SHEET, body: { transition: 'hand-in', expect: document.standing.revision, fit: true, reason: null } })
  }
}

/** The record without what only says where it is on its way. */
function recordText(document: Awaited<ReturnType<typeof documentOn>>): string {
  return canonicalJson(JSON.parse(JSON.stringify(document, (key: string, value: unknown) => key === 'isWaiting' ? undefined : value)))
}

describe('a phone and the server', () => {
  it('[MERGE10] show the same record: what was laid over on the phone is what the server makes of it', async () => {
    await fc.assert(fc.asyncProperty(fc.array(step, { minLength: 1, maxLength: 14 }), async (steps) => {
      const one = aPhone()
      opened.push(one)
      const server = new TestServer(() => one.person.id)
      await commit(one.store, [newSheet(SHEET)])
      for (const given of steps) {
        await play(one, server, given)
        server.now = Math.max(server.now, one.clock.milliseconds)
      }
      const before = await documentOn(one)
      expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
      expect(recordText(await documentOn(one))).toBe(recordText(before))
      expect(await one.store.db.outbox.count()).toBe(0)
    }), { numRuns: 40 })
  })

  it('[PUSH1] two phones on one sheet end with one record, and every operation is in the ledger', async () => {
    await fc.assert(fc.asyncProperty(fc.array(fc.tuple(fc.integer({ min: 0, max: 1 }), step), { minLength: 2, maxLength: 18 }), async (steps) => {
      const two = [aPhone(aPerson('One')), aPhone(aPerson('Two'))] as const
      opened.push(...two)
      const authors = new Map<string, string>()
      const server = new TestServer(dev => authors.get(dev) ?? 'somebody')
      await commit(two[0].store, [newSheet(SHEET)])
      for (const one of two) await syncRound(aContext(one, server))
      for (const [which, given] of steps) {
        await play(two[which]!, server, given)
        server.now = Math.max(server.now, two[0].clock.milliseconds, two[1].clock.milliseconds)
      }
      for (let round = 0; round < 2; round += 1) for (const one of two) expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
      expect(recordText(await documentOn(two[0]))).toBe(recordText(await documentOn(two[1])))
      for (const one of two) {
        expect(await one.store.db.outbox.count()).toBe(0)
        for (const { id } of await one.store.db.acked.toArray()) expect(server.ledger.has(id)).toBe(true)
      }
      expect(server.ledger.size).toBe((await Promise.all(two.map(one => one.store.db.acked.count()))).reduce((sum, count) => sum + count, 0))
    }), { numRuns: 40 })
  })
})
