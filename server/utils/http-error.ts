import { createError, setResponseHeader, setResponseStatus, type H3Error, type H3Event } from 'h3'

/** A refused request: screens branch on `data.code`, never on words. */
export function httpError(code: string, status: number, more: Record<string, unknown> = {}) {
  return createError({ status, statusText: code, message: code, data: { code, ...more } })
}

/**
 * Answers with a refusal. The server's own error page is left out of it: that one repeats the address, and with it whatever
 * host and query somebody sent.
 */
export function answerError(event: H3Event, error: H3Error): { error: true, statusCode: number, message: string, data: unknown } {
  setResponseStatus(event, error.statusCode, error.statusMessage)
  setResponseHeader(event, 'cache-control', 'no-store')
  return { error: true, statusCode: error.statusCode, message: error.statusMessage ?? '', data: error.data }
}
