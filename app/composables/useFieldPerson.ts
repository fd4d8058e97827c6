/**
 * The person who signed in last on this phone. Never waits for the network: without a connection the phone goes on for
 * that person.
 */
export function useFieldPerson() {
  const session = useSessionStore()
  session.followPhone()
  const { status, person, phoneName, others } = storeToRefs(session)
  return { status, person, phoneName, others }
}
