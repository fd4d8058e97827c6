import { REFUSED_WORDS } from './record-words'

const NOT_SENT = 'It could not be sent. Nothing was changed; try again when there is a connection.'
const SIGNED_OUT = 'You have been signed out. Nothing was changed. Sign in again in another tab, then press the button once more.'
const NOT_DONE = 'The server did not take it. Nothing was changed; try again.'

/** The code in an answer that refused something, such as `stale-state`; null when there was no answer or no code in it. */
export function refusalCode(error: unknown): string | null {
  const body = field(error, 'data')
  const code = field(field(body, 'data'), 'code') ?? field(body, 'code')
  return typeof code === 'string' ? code : null
}

/** Why a decision was not taken, in words: what happened, what is safe, what to do. */
export function refusalInWords(error: unknown): string {
  if (field(error, 'status') === 401) return SIGNED_OUT
  const code = refusalCode(error)
  if (code !== null) return REFUSED_WORDS[code] ?? NOT_DONE
  return typeof field(error, 'status') === 'number' ? NOT_DONE : NOT_SENT
}

function field(value: unknown, name: string): unknown {
  return typeof value === 'object' && value !== null ? (value as Record<string, unknown>)[name] : undefined
}
