import type { SignedIn } from '#shared/records/office-views'
import { can } from '#shared/access/policy'
import { peopleWithUnsentWork, rememberPerson } from '~/local/device'

/**
 * Signing in: the one thing that needs the network. The phone keeps who it was, so that the field opens as that person
 * without asking again.
 */
export function useSignIn() {
  const session = useSessionStore()
  const waitingHere = shallowRef<{ name: string, waiting: number }[]>([])

  onMounted(async () => {
    session.followPhone()
    waitingHere.value = (await peopleWithUnsentWork()).map(({ name, waiting }) => ({ name, waiting }))
  })

  /**
   * @param next path inside Lapel to go on to
   * @throws what the request threw; `useErrorText().request` has the words
   */
  async function signIn(email: string, password: string, next: string | null): Promise<void> {
    const person = await $fetch<SignedIn>('/api/session', { method: 'POST', body: { email, password }, timeout: 20_000, retry: 0 })
    session.signedIn = person
    if (can(person, { do: 'work-in-field' })) await rememberPerson(person)
    await navigateTo(next ?? (can(person, { do: 'see-office' }) ? '/office' : '/field'))
  }

  return { signIn, waitingHere, person: computed(() => session.person) }
}

/** A path to go on to after signing in: inside Lapel only, never another site. */
export function safeNext(next: unknown): string | null {
  return typeof next === 'string' && /^\/(field|office)(\/|\?|$)/.test(next) ? next : null
}
