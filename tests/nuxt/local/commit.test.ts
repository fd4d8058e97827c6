import { afterEach, describe, expect, it, vi } from 'vitest'
import { parseHlc } from '#shared/sync/hlc'
import { commit, InvalidChange, NotSaved } from '~/local/commit'
import { saveDraft } from '~/local/drafts'
import { aPhone, forget, newSheet, reading, setTask, startedSheet, type TestPhone } from './phone'

const opened: TestPhone[] = []
function phone() {
  const made = aPhone()
  opened.push(made)
  return made
}

afterEach(async () => {
  vi.restoreAllMocks()
  await forget(...opened.splice(0))
})

describe('commit', () => {
  it('[OP1] numbers operations from 1 and stamps them upwards, also when the clock goes back', async () => {
    const one = phone()
    const sheet = await startedSheet(one)
    one.clock.milliseconds -= 3_600_000
    const later = await commit(one.store, [reading(sheet, 2), reading(sheet, 2.01)])
    const all = await one.store.db.outbox.orderBy('n').toArray()
    expect(all.map(entry => entry.n)).toEqual([1, 2, 3])
    expect(all.map(entry => entry.op.hlc)).toEqual([...all.map(entry => entry.op.hlc)].sort())
    expect(new Set(all.map(entry => entry.op.hlc)).size).toBe(3)
    expect(parseHlc(later[0]!.hlc).wallMilliseconds).toBe(one.clock.milliseconds + 3_600_000)
    expect(later[0]!.enteredAt).toBe(new Date(one.clock.milliseconds).toISOString())
  })

  it('carries when it was entered, the zone, the monotonic clock and a corrected instant', async () => {
    const one = phone()
    const sheet = await startedSheet(one)
    const [op] = await commit(one.store, [{ ...reading(sheet, 2.03), at: '2026-03-03T06:40:00.000Z' }])
    expect(op).toMatchObject({
      at: '2026-03-03T06:40:00.000Z', enteredAt: '2026-03-03T07:00:00.000Z', zone: 'Europe/Dublin', mono: { milliseconds: 1000 }, offset: null, sheet,
      body: { data: { typed: '2,03', litresPerMinute: 2.03 } },
    })
  })

  it('takes the draft away in the same transaction that writes the operation', async () => {
    const one = phone()
    const sheet = await startedSheet(one)
    await saveDraft(one.store, `${sheet}/task`, 'sanding')
    await commit(one.store, [setTask(sheet, 'sanding')], { clearsDrafts: [`${sheet}/task`] })
    expect(await one.store.db.drafts.count()).toBe(0)
    expect(await one.store.db.outbox.count()).toBe(2)
  })

  it('refuses an impossible value with its reason and writes nothing', async () => {
    const one = phone()
    const sheet = await startedSheet(one)
    await expect(commit(one.store, [reading(sheet, 2), reading(sheet, -2)])).rejects.toBeInstanceOf(InvalidChange)
    expect(await one.store.db.outbox.count()).toBe(1)
    expect((await commit(one.store, [reading(sheet, 2)]))[0]!.n).toBe(2)
  })

  it('opens the database anew and writes once when the connection was lost', async () => {
    const one = phone()
    const sheet = await startedSheet(one)
    one.store.db.close({ disableAutoOpen: true })
    const [op] = await commit(one.store, [reading(sheet, 2)])
    expect((await one.store.db.outbox.where('id').equals(op!.id).toArray()).length).toBe(1)
    expect(await one.store.db.outbox.count()).toBe(2)
  })

  it('writes once when the first try completed without the page hearing of it', async () => {
    const one = phone()
    const sheet = await startedSheet(one)
    const transaction = one.store.db.transaction.bind(one.store.db)
    const spy = vi.spyOn(one.store.db, 'transaction').mockImplementationOnce((async (...given: Parameters<typeof transaction>) => {
      await transaction(...given)
      throw new Error('Connection to the database was lost')
    }) as unknown as typeof transaction)
    const [op] = await commit(one.store, [reading(sheet, 2)])
    expect(spy).toHaveBeenCalledTimes(2)
    const all = await one.store.db.outbox.orderBy('n').toArray()
    expect(all.map(entry => entry.n)).toEqual([1, 2])
    expect(all[1]!.id).toBe(op!.id)
  })

  it('tells those who wait for a commit after it completed, and not when it failed', async () => {
    const one = phone()
    const told = vi.fn()
    one.store.committed.add(told)
    const sheet = await startedSheet(one)
    expect(told).toHaveBeenCalledTimes(1)
    await expect(commit(one.store, [reading(sheet, -1)])).rejects.toBeInstanceOf(InvalidChange)
    expect(told).toHaveBeenCalledTimes(1)
  })
})

describe('a database that fails at its N-th request', () => {
  /** The write methods of an object store; reads fail through the same door of the request. */
  const METHODS = ['get', 'put', 'add', 'delete', 'openCursor', 'getAll', 'count'] as const

  /** Lets the N-th request of any kind throw, as a storage that is full or gone does. Returns how many were made. */
  function failAt(failing: number, times: number): () => number {
    let made = 0
    for (const proto of [IDBObjectStore.prototype, IDBIndex.prototype]) {
      for (const method of METHODS) {
        const original = (proto as unknown as Record<string, ((...given: unknown[]) => unknown) | undefined>)[method]
        if (!original) continue
        vi.spyOn(proto as unknown as Record<string, (...given: unknown[]) => unknown>, method).mockImplementation(function (this: unknown, ...given: unknown[]) {
          made += 1
          if (made >= failing && made < failing + times) throw new DOMException('The storage is full', 'QuotaExceededError')
          return original.apply(this, given)
        })
      }
    }
    return () => made
  }

  async function attempt(failing: number, times: number): Promise<{ isSaved: boolean, requests: number, waiting: number, drafts: number, lastN: number }> {
    const one = phone()
    const sheet = await startedSheet(one)
    await saveDraft(one.store, `${sheet}/task`, 'sanding')
    const requests = failAt(failing, times)
    let isSaved = true
    try {
      await commit(one.store, [setTask(sheet, 'sanding'), reading(sheet, 2)], { clearsDrafts: [`${sheet}/task`] })
    }
    catch (error) {
      expect(error).toBeInstanceOf(NotSaved)
      isSaved = false
    }
    const made = requests()
    vi.restoreAllMocks()
    await one.store.db.open()
    const outbox = await one.store.db.outbox.orderBy('n').toArray()
    return { isSaved, requests: made, waiting: outbox.length, drafts: await one.store.db.drafts.count(), lastN: outbox.at(-1)!.n }
  }

  it('leaves everything or nothing, for every N, and says which', async () => {
    const { requests } = await attempt(Infinity, 0)
    expect(requests).toBeGreaterThan(5)
    let failed = 0
    for (let failing = 1; failing <= requests; failing += 1) {
      const { isSaved, waiting, drafts, lastN } = await attempt(failing, Infinity)
      expect({ failing, isSaved, waiting, drafts, lastN }).toEqual(isSaved ? { failing, isSaved, waiting: 3, drafts: 0, lastN: 3 } : { failing, isSaved, waiting: 1, drafts: 1, lastN: 1 })
      if (!isSaved) failed += 1
    }
    expect(failed).toBe(requests)
  })

  it('saves on the second try when one request failed, for every N', async () => {
    const { requests } = await attempt(Infinity, 0)
    for (let failing = 1; failing <= requests; failing += 1) {
      expect(await attempt(failing, 1)).toMatchObject({ isSaved: true, waiting: 3, drafts: 0, lastN: 3 })
    }
  })

  it('starts a sheet after a failure with the number that was not used', async () => {
    const one = phone()
    failAt(1, Infinity)
    await expect(commit(one.store, [newSheet(one.store.surroundings.newId())])).rejects.toBeInstanceOf(NotSaved)
    vi.restoreAllMocks()
    await one.store.db.open()
    await startedSheet(one)
    expect((await one.store.db.outbox.toArray()).map(entry => entry.n)).toEqual([1])
  })
})
