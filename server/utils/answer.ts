import { isError, setResponseHeader, type H3Event } from 'h3'
import { Refusal } from '#server/services/refusal'
import { httpError } from './http-error'

/** Codes of PostgreSQL and the network that mean: the database is away or asks to try again. */
const AWAY = /^(08|53|57|40001|40P01)|^E(CONN|TIMEDOUT|PIPE|HOSTUNREACH)/

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
    if (isAway(error)) {
      setResponseHeader(event, 'retry-after', 2)
      throw httpError('database-away', 503)
    }
    console.error(`${event.method} ${event.path} failed:`, error)
    throw httpError('fault', 500)
  }
}

function isAway(error: unknown): boolean {
  for (let cause: unknown = error; cause instanceof Error; cause = cause.cause) {
    const code = 'code' in cause ? String(cause.code) : ''
    if (AWAY.test(code) || /Connection terminated|timeout exceeded when trying to connect/.test(cause.message)) return true
  }
  return false
}
