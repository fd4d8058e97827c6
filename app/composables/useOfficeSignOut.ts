import { currentPerson, leavePerson } from '~/local/device'

/** Signing out at a desk that others use too: nobody is told so before the server has ended the session. */
export function useOfficeSignOut() {
  const session = useSessionStore()
  const busy = ref(false)
  const failed = ref(false)

  async function signOut(): Promise<void> {
    busy.value = true
    failed.value = false
    try {
      await $fetch('/api/session', { method: 'DELETE', timeout: 10_000, retry: 0 })
      const onPhone = await currentPerson()
      if (onPhone && onPhone.id === session.signedIn?.id) await leavePerson()
      // Loaded anew, so that nothing of what this person saw stays in the page.
      await navigateTo('/sign-in', { external: true })
    }
    catch (error) {
      console.error(error)
      failed.value = true
    }
    finally {
      busy.value = false
    }
  }

  return { busy, failed, signOut }
}
