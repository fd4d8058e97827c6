import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { commit } from '~/local/commit'
import { createSyncEngine, type SyncEngine, type SyncEngineOptions } from '~/local/sync-engine'
import { NoAnswer, type Transport } from '~/local/transport'
import { aPhone, forget, reading, startedSheet, TestServer, type TestPhone } from './phone'

const opened: TestPhone[] = []
const engines: SyncEngine[] = []

function phone() {
  const made = aPhone()
  opened.push(made)
  return made
}

/** An engine whose appointments can be read and kept by hand: timers are the test's. */
function anEngine(one: TestPhone, transport: Transport, options: SyncEngineOptions = {}) {
  const engine = createSyncEngine(one.store, {
    transport, phone: async () => 'p_test', label: 'Test phone', random: () => 1, isVisible: () => true, isOnline: () => true,
    withLock: async (_name, work) => { await work(); return true }, ...options,
  })
  engines.push(engine)
  return engine
}

/** Only the engine's own appointments are counted: fake-indexeddb keeps its own. */
let appointments: { milliseconds: number, run: () => void, id: number }[] = []
const realSetTimeout = globalThis.setTimeout
const realClearTimeout = globalThis.clearTimeout
let nextId = -1

beforeEach(() => {
  appointments = []
  vi.spyOn(globalThis, 'setTimeout').mockImplementation(((run: () => void, milliseconds = 0, ...more: unknown[]) => {
    if (new Error('who').stack?.includes('sync-engine')) {
      appointments.push({ milliseconds, run, id: nextId -= 1 })
      return nextId
    }
    return realSetTimeout(run, milliseconds, ...more)
  }) as unknown as typeof setTimeout)
  vi.spyOn(globalThis, 'clearTimeout').mockImplementation(((id: number) => {
    if (typeof id === 'number' && id < 0) appointments = appointments.filter(item => item.id !== id)
    else realClearTimeout(id)
  }) as unknown as typeof clearTimeout)
})

afterEach(async () => {
  for (const engine of engines.splice(0)) engine.stop()
  vi.restoreAllMocks()
  await forget(...opened.splice(0))
})

/** Keeps the next appointment, and waits until the round it starts has made the next one. */
async function keepAppointment(one: TestPhone): Promise<number> {
  const [next] = appointments.splice(0, 1)
  expect(next).toBeDefined()
  one.clock.milliseconds += next!.milliseconds
  next!.run()
  await expect.poll(() => appointments.length).toBe(1)
  return next!.milliseconds
}

describe('the sync engine', () => {
  it('sends at once when it starts, then looks every five seconds while the page is in sight', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    const engine = anEngine(one, server)
    engine.start()
    expect(await keepAppointment(one)).toBe(0)
    expect(server.ledger.size).toBe(1)
    expect(engine.status().network).toBe('online')
    expect(appointments.map(item => item.milliseconds)).toEqual([5000])
  })

  it('sends one second after a commit, however many there are', async () => {
    const one = phone()
    const server = new TestServer()
    const engine = anEngine(one, server)
    engine.start()
    await keepAppointment(one)
    const sheet = await startedSheet(one)
    await commit(one.store, [reading(sheet, 2)])
    expect(appointments.map(item => item.milliseconds)).toEqual([1000])
    await keepAppointment(one)
    expect(server.pushes).toHaveLength(1)
    expect(server.ledger.size).toBe(2)
  })

  it('waits longer after every failure, up to five minutes, and at once is back when the network is', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    const engine = anEngine(one, server)
    engine.start()
    server.mishaps = Array.from({ length: 12 }, () => 'no-network' as const)
    const waits: number[] = []
    for (let count = 0; count < 11; count += 1) waits.push(await keepAppointment(one))
    expect(waits).toEqual([0, 1000, 2000, 4000, 8000, 16_000, 32_000, 64_000, 128_000, 256_000, 300_000])
    window.dispatchEvent(new Event('online'))
    expect(appointments.map(item => item.milliseconds)).toEqual([0])
    server.mishaps = []
    await keepAppointment(one)
    expect(server.ledger.size).toBe(1)
    expect(appointments.map(item => item.milliseconds)).toEqual([5000])
  })

  it('spreads its tries at random between nothing and the wait', async () => {
    const one = phone()
    const server = new TestServer()
    server.mishaps = ['no-network', 'no-network']
    anEngine(one, server, { random: () => 0.25 }).start()
    await keepAppointment(one)
    expect(appointments.map(item => item.milliseconds)).toEqual([250])
  })

  it('says signed out and keeps the queue, and sends it after signing in', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    server.mishaps = ['signed-out']
    const engine = anEngine(one, server)
    engine.start()
    await keepAppointment(one)
    expect(engine.status().network).toBe('signed-out')
    expect(await one.store.db.outbox.count()).toBe(1)
    await engine.sendNow()
    expect(engine.status().network).toBe('online')
    expect(await one.store.db.outbox.count()).toBe(0)
  })

  it.each([['portal', true, 'no-connection'], ['no-network', false, 'no-connection'], ['no-network', true, 'server-unreachable'], ['broken', true, 'server-unreachable']] as const)('tells the truth about the network after "%s" (browser says online: %s)', async (mishap, online, expected) => {
    const one = phone()
    const server = new TestServer()
    server.mishaps = [mishap]
    const engine = anEngine(one, server, { isOnline: () => online })
    engine.start()
    await keepAppointment(one)
    expect(engine.status().network).toBe(expected)
  })

  it('is stuck when the oldest change has not moved for two minutes although the server answers, and not while there is no network', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    const engine = anEngine(one, server)
    engine.start()
    server.mishaps = Array.from({ length: 4 }, () => 'no-network' as const)
    for (let count = 0; count < 4; count += 1) await keepAppointment(one)
    one.clock.milliseconds += 600_000
    server.mishaps = Array.from({ length: 40 }, () => 'broken' as const)
    await keepAppointment(one)
    expect(engine.status().stuckSinceMilliseconds).toBeNull()
    one.clock.milliseconds += 119_000
    await engine.sendNow()
    expect(engine.status().stuckSinceMilliseconds).toBeNull()
    const since = one.clock.milliseconds
    one.clock.milliseconds += 10_000
    await engine.sendNow()
    expect(engine.status().stuckSinceMilliseconds).not.toBeNull()
    expect(since - engine.status().stuckSinceMilliseconds!).toBeLessThan(130_000)
    server.mishaps = []
    await engine.sendNow()
    expect(engine.status().stuckSinceMilliseconds).toBeNull()
  })

  it('lets one tab send while another one is sending', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    let isTaken = false
    const withLock: SyncEngineOptions['withLock'] = async (_name, work) => {
      if (isTaken) return false
      isTaken = true
      try {
        await work()
        return true
      }
      finally {
        isTaken = false
      }
    }
    let release = () => {}
    const gate = new Promise<void>((resolve) => { release = resolve })
    const slow: Transport = { push: async (request) => { await gate; return server.push(request) }, pull: request => server.pull(request) }
    const first = anEngine(one, slow, { withLock })
    const second = anEngine(one, server, { withLock })
    const sending = first.sendNow()
    await expect.poll(() => isTaken).toBe(true)
    await second.sendNow()
    expect(server.pushes).toHaveLength(0)
    release()
    await sending
    expect(server.pushes).toHaveLength(1)
    expect(await one.store.db.outbox.count()).toBe(0)
  })

  it('goes on after a slow round, however many changes and networks came while it ran', async () => {
    const one = phone()
    const server = new TestServer()
    const sheet = await startedSheet(one)
    let release = () => {}
    let gate: Promise<void> | null = new Promise<void>((resolve) => { release = resolve })
    const slow: Transport = {
      push: async (request) => { await gate; return server.push(request) },
      pull: request => server.pull(request),
    }
    const engine = anEngine(one, slow)
    engine.start()
    appointments.splice(0, 1)[0]!.run()
    await expect.poll(() => engine.status().isSending).toBe(true)
    // The commit's own appointment comes due while the first round still waits for its answer.
    await commit(one.store, [reading(sheet, 2)])
    expect(appointments.map(item => item.milliseconds)).toEqual([1000])
    appointments.splice(0, 1)[0]!.run()
    gate = null
    release()
    await expect.poll(() => appointments.map(item => item.milliseconds)).toEqual([0])
    await keepAppointment(one)
    expect(server.ledger.size).toBe(2)
    expect(appointments.map(item => item.milliseconds)).toEqual([5000])
  })

  it('tries again soon when the network comes back in the middle of a round that fails', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    let fail = () => {}
    const hanging: Transport = {
      push: () => new Promise((_resolve, reject) => { fail = () => reject(new NoAnswer('network')) }),
      pull: request => server.pull(request),
    }
    const engine = anEngine(one, hanging)
    engine.start()
    appointments.splice(0, 1)[0]!.run()
    await expect.poll(() => engine.status().isSending).toBe(true)
    window.dispatchEvent(new Event('online'))
    appointments.splice(0, 1)[0]!.run()
    fail()
    await expect.poll(() => appointments.map(item => item.milliseconds)).toEqual([0])
  })

  it('makes the next appointment although the phone could not note how this round went', async () => {
    const one = phone()
    const server = new TestServer()
    await startedSheet(one)
    const engine = anEngine(one, server)
    vi.spyOn(console, 'error').mockImplementation(() => {})
    server.mishaps = ['no-network']
    engine.start()
    const put = vi.spyOn(one.store.db.meta, 'put').mockRejectedValue(new Error('Full.'))
    await keepAppointment(one)
    put.mockRestore()
    await keepAppointment(one)
    expect(server.ledger.size).toBe(1)
  })

  it('takes no harm when two tabs send at once', async () => {
    const one = phone()
    const server = new TestServer(() => one.person.id)
    const sheet = await startedSheet(one)
    await commit(one.store, [reading(sheet, 2), reading(sheet, 2.1)])
    await Promise.all([anEngine(one, server).sendNow(), anEngine(one, server).sendNow()])
    expect(server.ledger.size).toBe(3)
    expect(await one.store.db.outbox.count()).toBe(0)
    expect(await one.store.db.acked.count()).toBe(3)
  })
})
