import { createError } from 'h3'

/** A refused request: screens branch on `code`, never on words. The body is `{ data: { code, ... } }`. */
export function httpError(code: string, status: number, more: Record<string, unknown> = {}) {
  return createError({ status, statusText: code, message: code, data: { code, ...more } })
}
