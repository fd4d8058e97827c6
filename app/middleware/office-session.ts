import type { SignedIn } from '#shared/records/office-views'

/** The office is for people with a session at the server. The API asks again with every request; this is for comfort. */
export default defineNuxtRouteMiddleware(async (to) => {
  const session = useSessionStore()
  // In the browser the session was asked for when the page was made; the API says so when it has ended meanwhile.
  if (import.meta.client && session.signedIn) return
  try {
    session.signedIn = await useRequestFetch()<SignedIn>('/api/session')
  }
  catch (error) {
    const { status, statusCode } = error as { status?: number, statusCode?: number }
    if ((status ?? statusCode) === 401) return navigateTo({ path: '/sign-in', query: { next: to.fullPath } })
    throw createError({ status: 503, statusText: 'Not reachable', message: 'The server cannot be reached. Nothing was lost. Try again when there is a connection.', fatal: true })
  }
})
