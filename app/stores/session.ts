import type { SignedIn } from '#shared/records/office-views'
import { currentPerson, peopleWithUnsentWork, phoneLabel } from '~/local/device'
import { openFieldStore, type FieldStore } from '~/local/field-store'
import { followQuery } from '~/local/live'
import { createSheetsReader, type SheetsOnPhone } from '~/local/sheets'
import { createViewReader, type FieldView } from '~/local/view'

/**
 * Who is at work now. In the field that is the person who signed in last on this phone, whatever the network says; in the
 * office it is the session that the server knows (`signedIn`).
 */
export const useSessionStore = defineStore('session', () => {
  const status = ref<'loading' | 'nobody' | 'ready'>('loading')
  const person = shallowRef<SignedIn | null>(null)
  const phoneName = ref('')
  const others = shallowRef<{ name: string, waiting: number }[]>([])
  const fieldStore = shallowRef<FieldStore | null>(null)
  /** Everything on the phone as it stands, read once for all screens. */
  const view = shallowRef<FieldView | null>(null)
  /** The sheets in it, each read again only when something about it changed. */
  const sheets = shallowRef<SheetsOnPhone | null>(null)
  /** The phone's database cannot be read: the words of the failure. */
  const failure = ref<string | null>(null)
  const signedIn = shallowRef<SignedIn | null>(null)

  let endFollowing: (() => void) | undefined
  let endReading = () => {}
  const keyOf = (someone: SignedIn | null) => someone && `${someone.organisationId}:${someone.id}`

  /** Begins to follow who is at work on this phone; safe to call again. */
  function followPhone() {
    if (endFollowing || !import.meta.client) return
    phoneName.value = phoneLabel(navigator.userAgent)
    endFollowing = followQuery(currentPerson, take, fail)
  }

  function take(someone: SignedIn | null) {
    failure.value = null
    if (keyOf(someone) !== keyOf(person.value)) {
      endReading()
      fieldStore.value?.db.close()
      view.value = sheets.value = null
      fieldStore.value = someone && markRaw(openFieldStore(someone))
      if (fieldStore.value) readFrom(fieldStore.value)
    }
    person.value = someone
    status.value = someone ? 'ready' : 'nobody'
    void countOthers()
  }

  function readFrom(store: FieldStore) {
    const readSheets = createSheetsReader()
    endReading = followQuery(createViewReader(store).read, (next) => {
      if (next.revision !== view.value?.revision) sheets.value = readSheets(next)
      view.value = next
    }, fail)
  }

  function fail(error: unknown) {
    failure.value = error instanceof Error ? error.message : String(error)
    console.error(error)
  }

  async function countOthers() {
    others.value = (await peopleWithUnsentWork(person.value)).map(({ name, waiting }) => ({ name, waiting }))
  }

  function stopFollowing() {
    endFollowing?.()
    endReading()
    endFollowing = undefined
    fieldStore.value?.db.close()
    fieldStore.value = null
    view.value = sheets.value = null
    person.value = null
    status.value = 'loading'
  }

  return { status, person, phoneName, others, fieldStore, view, sheets, failure, signedIn, followPhone, countOthers, stopFollowing }
})
