import { currentPerson } from '~/local/device'

/** The field belongs to whoever signed in last on this phone. Asks the phone, never the network. */
export default defineNuxtRouteMiddleware(async () => {
  // The shell of the field is made once at build time, for nobody.
  if (import.meta.server) return
  if (!await currentPerson()) return navigateTo('/sign-in')
})
