import { isError, setResponseHeader, type H3Event } from 'h3'
import { isDatabaseAway } from '#server/services/database-away'
import { reasonOf } from '#server/services/reason-of'
import { Refusal } from '#server/services/refusal'
import { httpError, answerError } from './http-error'

/**
 * Runs a handler's work and turns what it throws into an answer: a refusal into its code, a database that is away into 503
 * with Retry-After, anything else into a bare 500 with the cause in the log only.
 */
export async function answer<T>(event: H3Event, work: () => Promise<T>): Promise<T> {
  try {
    return await work()
  }
  catch (error) {
    // What is sent instead of the answer has a status of its own; nobody takes it for a T.
    return answerError(event, refusalOf(event, error)) as T
  }
}

function refusalOf(event: H3Event, error: unknown): ReturnType<typeof httpError> {
  if (isError(error) && !error.unhandled) return httpError((error.data as { code?: string } | undefined)?.code ?? 'invalid-request', error.statusCode, error.data as Record<string, unknown> | undefined)
  if (error instanceof Refusal) {
    if (typeof error.more.retryAfterSeconds === 'number') setResponseHeader(event, 'retry-after', error.more.retryAfterSeconds)
    return httpError(error.code, error.status, error.more)
  }
  if (isDatabaseAway(error)) {
    setResponseHeader(event, 'retry-after', 2)
    return httpError('database-away', 503)
  }
  const places = error instanceof Error ? error.stack?.split('\n').filter(line => /^\s+at /.test(line)).slice(0, 8).join('\n') ?? '' : ''
  console.error(`${event.method} ${event.path.split('?')[0]} failed: ${reasonOf(error)}\n${places}`)
  return httpError('fault', 500)
}
