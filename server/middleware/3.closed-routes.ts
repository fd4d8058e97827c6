import { httpError, answerError } from '../utils/http-error'

/** The sign-in module brings routes of its own, which know nothing of sessions that were ended: ours are the only ones. */
export default defineEventHandler((event) => {
  if (/^\/api\/_auth(\/|$|\?)/.test(event.path)) return answerError(event, httpError('not-found', 404))
})
