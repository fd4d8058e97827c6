import { getRequestHeader } from 'h3'
import { httpError, answerError } from '../utils/http-error'

const READING = new Set(['GET', 'HEAD', 'OPTIONS'])

/** Changes come from our own pages only, as JSON: a form on another site can send neither. */
export default defineEventHandler((event) => {
  if (READING.has(event.method) || !event.path.startsWith('/api/')) return
  const site = getRequestHeader(event, 'sec-fetch-site')
  const origin = getRequestHeader(event, 'origin')
  const host = getRequestHeader(event, 'host')
  const isOwn = site !== undefined ? site === 'same-origin' : origin !== undefined && URL.canParse(origin) && new URL(origin).host === host
  if (!isOwn) return answerError(event, httpError('other-site', 403))
  const hasBody = event.method !== 'DELETE'
  if (hasBody && !/^application\/json\s*(;|$)/i.test(getRequestHeader(event, 'content-type') ?? '')) return answerError(event, httpError('not-json', 415))
})
