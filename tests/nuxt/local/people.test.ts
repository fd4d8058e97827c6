import { createPinia, setActivePinia } from 'pinia'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { effectScope, nextTick } from 'vue'
import { useDraft, flushDrafts } from '~/composables/useDraft'
import { useFieldDay } from '~/composables/useFieldDay'
import { useFieldPerson } from '~/composables/useFieldPerson'
import { useOutbox } from '~/composables/useOutbox'
import { useSheet } from '~/composables/useSheet'
import { useSignOut } from '~/composables/useSignOut'
import { useStartSheet } from '~/composables/useStartSheet'
import { commit } from '~/local/commit'
import { fieldDatabaseName } from '~/local/db'
import { closePhoneDatabase, currentPerson, leavePerson, peopleWithUnsentWork, phoneId, phoneLabel, rememberPerson, unsentOf } from '~/local/device'
import { exportUnsent } from '~/local/export-unsent'
import { openFieldStore } from '~/local/field-store'
import { useSessionStore } from '~/stores/session'
import { useSyncStore } from '~/stores/sync'
import { syncRound } from '~/local/sync-round'
import { aContext, aPerson, aPhone, newSheet, reading, setTask, startedSheet, SURVEY, TestServer } from './phone'
import Dexie from 'dexie'

const scopes: ReturnType<typeof effectScope>[] = []
function inScope<T>(work: () => T): T {
  const scope = effectScope()
  scopes.push(scope)
  return scope.run(work)!
}

beforeEach(() => { setActivePinia(createPinia()) })

afterEach(async () => {
  for (const scope of scopes.splice(0)) scope.stop()
  useSyncStore().stop()
  useSessionStore().stopFollowing()
  closePhoneDatabase()
  vi.restoreAllMocks()
  localStorage.clear()
  for (const name of await Dexie.getDatabaseNames()) await Dexie.delete(name)
})

describe('the phone and its people', () => {
  it('has one id of its own, whoever works on it', async () => {
    const id = await phoneId()
    await rememberPerson(aPerson('One'))
    expect(await phoneId()).toBe(id)
    expect(id).toMatch(/^p_/)
  })

  it('works for whoever signed in last, until that person signs out', async () => {
    const [one, two] = [aPerson('One'), aPerson('Two')]
    expect(await currentPerson()).toBeNull()
    await rememberPerson(one)
    await rememberPerson(two)
    expect(await currentPerson()).toEqual(two)
    await leavePerson()
    expect(await currentPerson()).toBeNull()
  })

  it('never mixes the work of two people, and counts what each still has here', async () => {
    const [one, two] = [aPerson('One'), aPerson('Two')]
    for (const person of [one, two]) await rememberPerson(person)
    const store = openFieldStore(one)
    await commit(store, [newSheet('00000000-0000-4000-8000-0000000000aa')])
    store.db.close()
    expect(await peopleWithUnsentWork()).toMatchObject([{ name: 'One', waiting: 1 }])
    expect(await peopleWithUnsentWork(one)).toEqual([])
    expect(await unsentOf(two)).toBe(0)
    expect(await Dexie.exists(fieldDatabaseName(two.organisationId, two.id))).toBe(false)
  })

  it('names the kind of phone and nothing of its owner', () => {
    expect(phoneLabel('Mozilla/5.0 (Linux; Android 14; Model X of Ada) AppleWebKit/537.36 Chrome/130.0 Mobile Safari/537.36')).toBe('Chrome on Android')
    expect(phoneLabel('Mozilla/5.0 (iPhone; CPU iPhone OS 18_0 like Mac OS X) Version/18.0 Mobile Safari/604.1')).toBe('Safari on iOS')
  })
})

describe('the composables of the field', () => {
  it('find the person without a network, and change over when another one signs in', async () => {
    const asked = vi.spyOn(globalThis, 'fetch')
    const one = aPerson('One')
    const { status, person, others } = inScope(useFieldPerson)
    await expect.poll(() => status.value).toBe('nobody')
    await rememberPerson(one)
    await expect.poll(() => status.value).toBe('ready')
    expect(person.value).toEqual(one)
    await commit(useSessionStore().fieldStore!, [newSheet('00000000-0000-4000-8000-0000000000ab')])
    await rememberPerson(aPerson('Two'))
    await expect.poll(() => person.value?.name).toBe('Two')
    await expect.poll(() => others.value).toEqual([{ name: 'One', waiting: 1 }])
    await expect.poll(() => useSessionStore().view?.outbox.length).toBe(0)
    expect(asked).not.toHaveBeenCalled()
  })

  it('start a sheet, write on it and show it on the board at once, all waiting', async () => {
    await rememberPerson(aPerson('One'))
    const start = inScope(useStartSheet)
    const day = inScope(useFieldDay)
    const outbox = inScope(useOutbox)
    await expect.poll(() => day.status.value).toBe('loading')
    await expect.poll(() => useSessionStore().fieldStore).not.toBeNull()
    const id = await start.fromNothing({ surveyId: SURVEY, kind: 'area', air: 'pumped' })
    const sheet = inScope(() => useSheet(id))
    await expect.poll(() => sheet.status.value).toBe('ready')
    await sheet.setField('number', 'A-7')
    await sheet.addNote('Dusty')
    await expect.poll(() => sheet.bundle.value?.document.sheet.number).toBe('A-7')
    await expect.poll(() => sheet.waiting.value).toBe(3)
    expect(day.sheets.value).toMatchObject([{ waiting: 3, needsYou: false, assessment: { progress: 'planned' } }])
    expect(outbox.entries.value.map(entry => [entry.what, entry.sheetNumber, entry.state])).toEqual([['New sheet', 'A-7', 'waiting'], ['Sample number', 'A-7', 'waiting'], ['Note', 'A-7', 'waiting']])
    expect(sheet.canEdit.value).toBe(true)
    const copy = JSON.parse(await (await outbox.exportCopy()).text()) as { operations: unknown[], format: string }
    expect(copy.format).toBe('lapel-unsent')
    expect(copy.operations).toHaveLength(3)
    expect(useSyncStore().chip).toMatchObject({ kind: 'saved-here', count: 3 })
  })

  it('name the sheet and the field that two phones gave different values, where the bar sends the person', async () => {
    const one = aPhone()
    await rememberPerson(one.person)
    const server = new TestServer(() => one.person.id)
    const sheetId = await startedSheet(one, { number: 'A-7' })
    const [first] = await commit(one.store, [setTask(sheetId, 'sanding')])
    await syncRound(aContext(one, server))
    const other = { ...(await commit(one.store, [setTask(sheetId, 'welding', first!.id)]))[0]!, id: one.store.surroundings.newId() }
    await one.store.db.outbox.clear()
    one.clock.milliseconds += 1000
    await commit(one.store, [setTask(sheetId, 'grinding', first!.id)])
    await server.push({ v: 1, dev: 'd_other', phone: 'p_other', label: '', epoch: null, sv: 1, pending: 1, oldest: null, blobs: 0, cursor: 0, now: other.at, ops: [other] })
    await syncRound(aContext(one, server))
    one.store.db.close()
    const outbox = inScope(useOutbox)
    await expect.poll(() => outbox.conflicts.value).toEqual([{ sheetId, name: 'A-7', fields: ['Task'] }])
    expect(outbox.entries.value).toEqual([])
    expect(useSyncStore().chip).toMatchObject({ kind: 'needs-you', count: 1 })
  })

  it('say when a sheet is not here', async () => {
    await rememberPerson(aPerson('One'))
    const sheet = inScope(() => useSheet('00000000-0000-4000-8000-0000000000ff'))
    await expect.poll(() => useSessionStore().view).not.toBeNull()
    expect(sheet.status.value).toBe('loading')
    const store = useSessionStore().fieldStore!
    await store.db.meta.put({ k: 'cursor', value: { epoch: 'e1', ver: 1, scopes: [], paging: null, isComplete: true } })
    await expect.poll(() => sheet.status.value).toBe('missing')
    await expect(sheet.addNote('x')).resolves.toBeTruthy()
  })
})

describe('signing out', () => {
  it('keeps the outbox, the drafts and the person\'s database, also without a network', async () => {
    vi.stubGlobal('$fetch', vi.fn(() => Promise.reject(new TypeError('no network'))))
    const one = aPerson('One')
    await rememberPerson(one)
    const { waiting, signOut } = inScope(useSignOut)
    await expect.poll(() => useSessionStore().fieldStore).not.toBeNull()
    const { text } = inScope(() => useDraft('some/key'))
    await commit(useSessionStore().fieldStore!, [newSheet('00000000-0000-4000-8000-0000000000ac'), reading('00000000-0000-4000-8000-0000000000ac', 2)])
    await expect.poll(() => waiting.value).toBe(2)
    text.value = 'half a wor'
    await nextTick()
    await signOut()
    vi.unstubAllGlobals()
    await expect.poll(() => useSessionStore().status).toBe('nobody')
    expect(await unsentOf(one)).toBe(2)
    const store = openFieldStore(one)
    expect((await store.db.drafts.toArray()).map(draft => draft.text)).toEqual(['half a wor'])
    store.db.close()
  })
})

describe('a draft', () => {
  async function ready() {
    await rememberPerson(aPerson('One'))
    useSessionStore().followPhone()
    await expect.poll(() => useSessionStore().fieldStore).not.toBeNull()
    return useSessionStore().fieldStore!
  }

  it('is kept 400 ms after the last key and given back to the next page', async () => {
    const store = await ready()
    const first = inScope(() => useDraft('sheet/task'))
    await expect.poll(() => first.isReady.value).toBe(true)
    first.text.value = 'sanding do'
    await expect.poll(() => store.db.drafts.get('sheet/task')).toMatchObject({ text: 'sanding do' })
    const second = inScope(() => useDraft('sheet/task'))
    await expect.poll(() => second.text.value).toBe('sanding do')
    await second.clear()
    expect(await store.db.drafts.count()).toBe(0)
    expect(second.text.value).toBe('')
  })

  it('is given back when the page went away before the database had it', async () => {
    const store = await ready()
    const first = inScope(() => useDraft('sheet/task'))
    await expect.poll(() => first.isReady.value).toBe(true)
    vi.spyOn(store.db.drafts, 'put').mockImplementation((() => new Promise(() => {})) as never)
    first.text.value = 'sanding doors'
    window.dispatchEvent(new Event('pagehide'))
    vi.restoreAllMocks()
    const second = inScope(() => useDraft('sheet/task'))
    await expect.poll(() => second.text.value).toBe('sanding doors')
    expect(await store.db.drafts.get('sheet/task')).toMatchObject({ text: 'sanding doors' })
    expect(localStorage.length).toBe(0)
  })

  it('never overwrites what was typed while the phone was still reading', async () => {
    const store = await ready()
    await store.db.drafts.put({ key: 'sheet/task', text: 'old', changedAt: '2026-03-03T07:00:00.000Z' })
    const draft = inScope(() => useDraft('sheet/task'))
    draft.text.value = 'new'
    await expect.poll(() => draft.isReady.value).toBe(true)
    expect(draft.text.value).toBe('new')
  })

  it('is written down at once when an update asks for it', async () => {
    const store = await ready()
    const draft = inScope(() => useDraft('sheet/task'))
    await expect.poll(() => draft.isReady.value).toBe(true)
    draft.text.value = 'san'
    await flushDrafts()
    expect(await store.db.drafts.get('sheet/task')).toMatchObject({ text: 'san' })
  })

  it('stays with its own field when the page shows another one', async () => {
    const store = await ready()
    const key = ref('one/task')
    const draft = inScope(() => useDraft(key))
    await expect.poll(() => draft.isReady.value).toBe(true)
    draft.text.value = 'sanding'
    key.value = 'two/task'
    await expect.poll(() => draft.text.value).toBe('')
    await expect.poll(() => store.db.drafts.get('one/task')).toMatchObject({ text: 'sanding' })
    expect(await store.db.drafts.get('two/task')).toBeUndefined()
  })
})

it('the copy of what is unsent is word for word what would be sent', async () => {
  const store = openFieldStore(aPerson('One'))
  const written = await commit(store, [newSheet('00000000-0000-4000-8000-0000000000ad'), reading('00000000-0000-4000-8000-0000000000ad', 2.03)])
  const copy = JSON.parse(await (await exportUnsent(store)).text()) as { operations: unknown[] }
  expect(copy.operations).toEqual(written)
  expect(await store.db.outbox.count()).toBe(2)
  store.db.close()
})
