import { afterEach, describe, expect, it, vi } from 'vitest'
import { MAX_BODY_BYTES, type PushRequest } from '#shared/sync/protocol'
import { sheetDocumentOf } from '#shared/sync/read-rows'
import { commit } from '~/local/commit'
import { EMPTY_CURSOR, readMeta } from '~/local/db'
import { nextBatch, pruneAcknowledged, settle } from '~/local/outbox'
import { keepPage } from '~/local/pull'
import { syncRound } from '~/local/sync-round'
import { createViewReader } from '~/local/view'
import { aContext, aPhone, forget, ORGANISATION, reading, setTask, startedSheet, SURVEY, TestServer, type TestPhone } from './phone'

const opened: TestPhone[] = []
function phone(...given: Parameters<typeof aPhone>) {
  const made = aPhone(...given)
  opened.push(made)
  return made
}

afterEach(async () => {
  vi.restoreAllMocks()
  await forget(...opened.splice(0))
})

async function documentOn(one: TestPhone, sheet: string) {
  const view = await createViewReader(one.store).read()
  const rows = view.groups.get(sheet)
  return { view, document: rows ? sheetDocumentOf(rows) : null }
}

describe('a round of sync', () => {
  it('sends everything in order, and shows the same record before, between and after', async () => {
    const one = phone()
    const server = new TestServer(() => one.person.id)
    const sheet = await startedSheet(one, { number: 'A-1' })
    await commit(one.store, [setTask(sheet, 'sanding'), reading(sheet, 2), reading(sheet, 2.02)])
    const strip = (document: Awaited<ReturnType<typeof documentOn>>['document']) => JSON.parse(JSON.stringify(document).replaceAll('"isWaiting":true', '"isWaiting":false')) as unknown
    const before = (await documentOn(one, sheet)).document
    expect(before!.events.map(event => event.isWaiting)).toEqual([true, true])

    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
    const after = await documentOn(one, sheet)
    expect(strip(after.document)).toEqual(strip(before))
    expect(after.document!.events.map(event => event.isWaiting)).toEqual([false, false])
    expect(after.view.outbox).toEqual([])
    expect(await one.store.db.acked.count()).toBe(4)
    expect(await one.store.db.rows.count()).toBe(server.rows.size)
  })

  it('keeps what was acknowledged on the screen until it comes back in the pull', async () => {
    const one = phone()
    const server = new TestServer(() => one.person.id)
    const sheet = await startedSheet(one)
    await commit(one.store, [reading(sheet, 2)])
    server.mishaps = ['none', 'no-network']
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'no-answer', why: 'network' })
    expect(await one.store.db.outbox.count()).toBe(0)
    const { document } = await documentOn(one, sheet)
    expect(document!.events).toHaveLength(1)
    expect(document!.events[0]!.isWaiting).toBe(false)
  })

  it('[PUSH2] sends again after a lost reply, and has an effect once', async () => {
    const one = phone()
    const server = new TestServer(() => one.person.id)
    const sheet = await startedSheet(one)
    await commit(one.store, [reading(sheet, 2)])
    server.mishaps = ['reply-lost']
    expect(await syncRound(aContext(one, server))).toMatchObject({ kind: 'no-answer' })
    expect(await one.store.db.outbox.count()).toBe(2)
    const text = server.text()
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
    expect((await one.store.db.acked.toArray()).map(entry => entry.outcome)).toEqual(['dup', 'dup'])
    expect(server.text()).toBe(text)
    expect((await documentOn(one, sheet)).document!.events).toHaveLength(1)
  })

  it('sends again when the app is killed between the answer and its being written down', async () => {
    const one = phone()
    const server = new TestServer(() => one.person.id)
    const sheet = await startedSheet(one)
    await commit(one.store, [reading(sheet, 2)])
    const kill = vi.spyOn(one.store.db.acked, 'put').mockImplementation(() => { throw new Error('killed') })
    await expect(syncRound(aContext(one, server))).rejects.toThrow('killed')
    kill.mockRestore()
    expect(await one.store.db.outbox.count()).toBe(2)
    expect(await one.store.db.acked.count()).toBe(0)
    await syncRound(aContext(one, server))
    expect(await one.store.db.outbox.count()).toBe(0)
    expect(server.ledger.size).toBe(2)
  })

  it('[PUSH7] keeps an operation whose outcome it does not know, shows it, and goes on with the others', async () => {
    const one = phone()
    const server = new TestServer(() => one.person.id)
    const sheet = await startedSheet(one)
    const [strange] = await commit(one.store, [reading(sheet, 2)])
    server.answers.set(strange!.id, ['weighed', null])
    await commit(one.store, [reading(sheet, 2.1)])
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
    const { view, document } = await documentOn(one, sheet)
    expect(view.outbox.map(entry => [entry.id, entry.state])).toEqual([[strange!.id, 'kept']])
    expect(view.refusals).toMatchObject([{ id: strange!.id, reason: 'weighed', outcome: 'kept' }])
    expect(document!.events).toHaveLength(2)
  })

  it.each(['held', 'parked', 'refused'])('[PUSH4] takes "%s" as received, lays the change over no more, and says that it needs somebody', async (outcome) => {
    const one = phone()
    const server = new TestServer(() => one.person.id)
    const sheet = await startedSheet(one)
    const [op] = await commit(one.store, [reading(sheet, 2)])
    server.answers.set(op!.id, [outcome, 'locked'])
    await syncRound(aContext(one, server))
    const { view, document } = await documentOn(one, sheet)
    expect(view.outbox).toEqual([])
    expect(document!.events).toEqual([])
    expect(view.refusals).toMatchObject([{ id: op!.id, outcome, reason: 'locked' }])
    expect((await one.store.db.acked.where('id').equals(op!.id).first())!.op).toEqual(op)
  })

  it('keeps the queue when the session has ended', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    server.mishaps = ['signed-out']
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'signed-out' })
    expect((await one.store.db.outbox.toArray()).map(entry => entry.state)).toEqual(['new'])
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
  })

  it.each(['portal', 'wrong-version'] as const)('takes an answer from something else (%s) as no network, on the way out and in', async (mishap) => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    server.mishaps = [mishap, 'none', mishap]
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'not-ours' })
    expect(await one.store.db.outbox.count()).toBe(1)
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'not-ours' })
    expect(await readMeta(one.store.db, 'cursor')).toBeUndefined()
    expect(await one.store.db.rows.count()).toBe(0)
  })

  it.each(['too-large', 'timeout'] as const)('halves a batch that meets "%s", down to one, and then sends all of it', async (mishap) => {
    const one = phone()
    const server = new TestServer()
    const sheet = await startedSheet(one)
    await commit(one.store, Array.from({ length: 7 }, (_, index) => reading(sheet, 2 + index / 100)))
    server.mishaps = [mishap, mishap, mishap]
    await syncRound(aContext(one, server))
    expect(server.pushes.slice(0, 4).map(request => request.ops.length)).toEqual([8, 4, 2, 1])
    expect(await one.store.db.outbox.count()).toBe(0)
    expect(server.ledger.size).toBe(8)
  })

  it('puts the one operation aside that the server cannot read, and sends the rest', async () => {
    const one = phone()
    const server = new TestServer()
    const sheet = await startedSheet(one)
    const written = await commit(one.store, [reading(sheet, 2), reading(sheet, 2.1), reading(sheet, 2.2)])
    const poison = written[1]!.id
    const push = server.push.bind(server)
    server.push = async (request: PushRequest) => request.ops.some(op => op.id === poison)
      ? { status: 422, body: { statusCode: 422 }, retryAfterSeconds: null }
      : push(request)
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
    expect((await one.store.db.outbox.toArray()).map(entry => [entry.id, entry.state, entry.reason])).toEqual([[poison, 'kept', 'not-understood']])
    expect(server.ledger.size).toBe(3)
  })

  it('[PULL5] keeps the outbox and what was acknowledged when the server was rebuilt, and pulls from the beginning', async () => {
    const one = phone()
    const server = new TestServer()
    const sheet = await startedSheet(one)
    await syncRound(aContext(one, server))
    await commit(one.store, [reading(sheet, 2)])
    server.epoch = 'e2'
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
    expect(await one.store.db.acked.count()).toBe(2)
    expect(await readMeta(one.store.db, 'cursor')).toMatchObject({ epoch: 'e2', isComplete: true })
    expect((await documentOn(one, sheet)).document!.events).toHaveLength(1)
  })

  it('takes a new name when its storage went back in time, and keeps its queue', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    const before = (await aDev(one))
    server.fork = true
    await syncRound(aContext(one, server))
    const after = await aDev(one)
    expect(after).not.toBe(before)
    await startedSheet(one)
    await syncRound(aContext(one, server))
    expect(server.pushes.at(-1)!.dev).toBe(after)
    expect(server.ledger.size).toBe(2)
  })
})

const aDev = (one: TestPhone) => readMeta(one.store.db, 'dev')

describe('pulling', () => {
  const aRow = (object: string, scope: string, ver: number) => ({
    t: 'obj' as const, id: object, scope, object, ver, gone: false,
    data: { type: 'sheet', parent: scope, initial: { number: `N-${ver}` }, op: object, author: 'office', dev: 'office', at: '2026-03-03T07:00:00.000Z' },
  })
  const sheetId = (number: number) => `00000000-0000-4000-8000-0000000001${number.toString().padStart(2, '0')}`

  it('[PULL3] keeps a page and the cursor together or not at all', async () => {
    const one = phone()
    const page = { v: 1, time: '2026-03-03T07:00:00.000Z', epoch: 'e1', to: 2, rows: [aRow(sheetId(1), SURVEY, 2)], scopes: { '+': [SURVEY], '-': [] }, next: { ver: 2, after: null }, more: false }
    const put = vi.spyOn(one.store.db.meta, 'put').mockImplementation(() => { throw new Error('killed') })
    await expect(keepPage(one.store, EMPTY_CURSOR, page)).rejects.toThrow('killed')
    put.mockRestore()
    expect(await one.store.db.rows.count()).toBe(0)
    expect(await readMeta(one.store.db, 'cursor')).toBeUndefined()
    expect(await keepPage(one.store, EMPTY_CURSOR, page)).toBe(true)
    expect(await one.store.db.rows.count()).toBe(1)
    expect(await readMeta(one.store.db, 'cursor')).toMatchObject({ ver: 2, scopes: [SURVEY], isComplete: true })
  })

  it('[PULL2] goes on between two pages after a cut, inside one version too', async () => {
    const one = phone()
    const server = new TestServer()
    server.put(Array.from({ length: 5 }, (_, index) => aRow(sheetId(index), SURVEY, 1)))
    server.pageSize = 2
    server.mishaps = ['none', 'no-network']
    expect(await syncRound(aContext(one, server))).toMatchObject({ kind: 'no-answer' })
    expect(await readMeta(one.store.db, 'cursor')).toMatchObject({ isComplete: false, scopes: [] })
    expect(await one.store.db.rows.count()).toBe(2)
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
    expect(await one.store.db.rows.count()).toBe(5)
    expect(new Set(server.pulls.map(request => request.to ?? 1))).toEqual(new Set([1]))
    expect(await readMeta(one.store.db, 'cursor')).toMatchObject({ isComplete: true, scopes: [ORGANISATION, SURVEY], paging: null })
  })

  it('[PULL4] fills a scope that is new with its old rows, and loses the rows of one that went, never the outbox', async () => {
    const one = phone()
    const server = new TestServer()
    server.scopes = [ORGANISATION]
    const reader = createViewReader(one.store)
    server.put([aRow(sheetId(1), SURVEY, 1)])
    server.put([aRow(sheetId(2), ORGANISATION, 2)])
    await syncRound(aContext(one, server))
    expect([...(await reader.read()).groups.keys()]).toEqual([sheetId(2)])
    server.scopes = [ORGANISATION, SURVEY]
    await syncRound(aContext(one, server))
    expect([...(await reader.read()).groups.keys()].sort()).toEqual([sheetId(1), sheetId(2)])

    await commit(one.store, [reading(sheetId(1), 2)])
    server.scopes = [ORGANISATION]
    server.mishaps = ['no-network', 'none']
    await syncRound(aContext(one, server))
    server.mishaps = ['broken']
    await syncRound(aContext(one, server))
    expect(await one.store.db.outbox.count()).toBe(1)
    await syncRound(aContext(one, server))
    expect([...(await reader.read()).groups.keys()]).toEqual([sheetId(2)])
    expect(await one.store.db.acked.count()).toBe(1)
  })

  it('keeps a row of a kind that it does not know for the version that does', async () => {
    const one = phone()
    const server = new TestServer()
    server.put([{ ...aRow(sheetId(1), SURVEY, 1), t: 'photo' as 'obj' }, aRow(sheetId(2), SURVEY, 1)])
    expect(await syncRound(aContext(one, server))).toEqual({ kind: 'done' })
    expect(await one.store.db.rows.count()).toBe(2)
    expect([...(await createViewReader(one.store).read()).groups.keys()]).toEqual([sheetId(2)])
  })

  it('does not take a page that another tab has overtaken', async () => {
    const one = phone()
    const page = { v: 1, time: '2026-03-03T07:00:00.000Z', epoch: 'e1', to: 2, rows: [], scopes: { '+': [], '-': [] }, next: { ver: 2, after: null }, more: false }
    expect(await keepPage(one.store, EMPTY_CURSOR, page)).toBe(true)
    expect(await keepPage(one.store, EMPTY_CURSOR, page)).toBe(false)
  })

  it('measures how far the phone\'s clock is off and stamps it on what is written afterwards', async () => {
    const one = phone()
    const server = new TestServer()
    server.now = one.clock.milliseconds + 47 * 60_000
    const sheet = await startedSheet(one)
    await syncRound(aContext(one, server))
    const [op] = await commit(one.store, [reading(sheet, 2)])
    expect(op!.offset).toBe(47 * 60_000)
    expect(op!.enteredAt).toBe(new Date(one.clock.milliseconds).toISOString())
  })
})

describe('the outbox', () => {
  it('gives batches that the server takes in number and in bytes', async () => {
    const one = phone()
    const sheet = await startedSheet(one)
    const note = (length: number) => ({ kind: 'ev.add' as const, object: sheet, sheet, body: { type: 'note', data: { text: 'x'.repeat(length) }, corrects: null, reason: null } })
    await commit(one.store, Array.from({ length: 200 }, () => note(9000)))
    const batch = await nextBatch(one.store, 500)
    expect(batch.length).toBeGreaterThan(50)
    expect(JSON.stringify(batch.map(entry => entry.op)).length).toBeLessThan(MAX_BODY_BYTES)
    expect((await nextBatch(one.store, 10)).length).toBe(10)
    expect((await nextBatch(one.store, 10_000)).length).toBeLessThanOrEqual(500)
  })

  it('leaves an operation that the answer does not speak of, and takes nothing for another one of the same number', async () => {
    const one = phone()
    await startedSheet(one)
    await startedSheet(one)
    const sent = await nextBatch(one.store, 500)
    await settle(one.store, 'd_x', [{ ...sent[0]!, id: one.store.surroundings.newId() }, sent[1]!], { res: [[sent[0]!.n, 'ok', null]], ver: 1, stable: 0, fork: false })
    expect(await one.store.db.outbox.count()).toBe(2)
  })

  it('keeps acknowledged operations until they are backed up or thirty days old', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    await syncRound(aContext(one, server))
    one.clock.milliseconds += 29 * 86_400_000
    await pruneAcknowledged(one.store)
    expect(await one.store.db.acked.count()).toBe(1)
    one.clock.milliseconds += 2 * 86_400_000
    await pruneAcknowledged(one.store)
    expect(await one.store.db.acked.count()).toBe(0)
    await startedSheet(one)
    await pruneAcknowledged(one.store)
    expect(await one.store.db.outbox.count()).toBe(1)
  })
})
