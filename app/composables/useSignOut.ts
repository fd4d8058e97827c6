import { leavePerson } from '~/local/device'

/** Signing out on this phone. What waits stays on it, for the day its person signs in again. */
export function useSignOut() {
  const session = useSessionStore()
  session.followPhone()
  const sync = useSyncStore()
  const waiting = computed(() => session.view?.outbox.length ?? 0)

  async function signOut(): Promise<void> {
    await flushDrafts()
    sync.stop()
    await leavePerson()
    session.signedIn = null
    try {
      await $fetch('/api/session', { method: 'DELETE', timeout: 10_000 })
    }
    catch (error) {
      // Without a network the phone is signed out all the same; the server's session ends by itself or at the next sign-in.
      if (requestCode(error) !== 'no-answer') console.error(error)
    }
    await navigateTo('/sign-in')
  }

  return { waiting, signOut }
}
