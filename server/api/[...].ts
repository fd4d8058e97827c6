import { defineEventHandler, setResponseHeader } from 'h3'
import { httpError, answerError } from '../utils/http-error'

/** Whatever is no route of the API: 405 with the verbs that there are, or 404. */
export default defineEventHandler((event) => {
  const verbs = Object.keys(event.context.matchedRoute?.handlers ?? {}).filter(verb => verb !== 'all')
  if (verbs.length === 0) return answerError(event, httpError('not-found', 404))
  setResponseHeader(event, 'allow', verbs.map(verb => verb.toUpperCase()).join(', '))
  return answerError(event, httpError('other-verb', 405))
})
