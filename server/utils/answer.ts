import { isError, setResponseHeader, type H3Event } from 'h3'
import { isDatabaseAway } from '#server/services/database-away'
import { Refusal } from '#server/services/refusal'
import { httpError } from './http-error'

/**
 * Runs a handler's work and turns what it throws into an answer: a refusal into its code, a database that is away into 503
 * with Retry-After, anything else into a bare 500 with the cause in the log only.
 */
export async function answer<T>(event: H3Event, work: () => Promise<T>): Promise<T> {
  try {
    return await work()
  }
  catch (error) {
    if (isError(error)) throw error
    if (error instanceof Refusal) {
      if (typeof error.more.retryAfterSeconds === 'number') setResponseHeader(event, 'retry-after', error.more.retryAfterSeconds)
      throw httpError(error.code, error.status, error.more)
    }
    if (isDatabaseAway(error)) {
      setResponseHeader(event, 'retry-after', 2)
      throw httpError('database-away', 503)
    }
    console.error(`${event.method} ${event.path} failed:`, error)
    throw httpError('fault', 500)
  }
}
