import { PROTOCOL_VERSION } from '#shared/sync/protocol'
import type { Answer } from './transport'

/** What an answer means to a phone. */
export type Meaning<T>
  = | { kind: 'ok', data: T }
    | { kind: 'signed-out' }
    | { kind: 'other-epoch', epoch: string }
    | { kind: 'too-large' }
    | { kind: 'not-understood' }
    | { kind: 'busy', retryAfterSeconds: number | null }
    /** Something that is not our server answered: a portal of the building's network, or a proxy. As good as no network. */
    | { kind: 'not-ours' }

interface AnswerSchema<T> { safeParse: (value: unknown) => { success: true, data: T } | { success: false } }

/** Reads an answer. Nothing counts as a good answer but JSON of our protocol's version that has the expected shape. */
export function readAnswer<T>(answer: Answer, schema: AnswerSchema<T>): Meaning<T> {
  const { status, body } = answer
  if (status === 413) return { kind: 'too-large' }
  if (body === null || typeof body !== 'object') {
    return status === 429 || status >= 500 ? { kind: 'busy', retryAfterSeconds: answer.retryAfterSeconds } : { kind: 'not-ours' }
  }
  if (status >= 200 && status < 300) {
    if ((body as { v?: unknown }).v !== PROTOCOL_VERSION) return { kind: 'not-ours' }
    const parsed = schema.safeParse(body)
    return parsed.success ? { kind: 'ok', data: parsed.data } : { kind: 'not-ours' }
  }
  if (status === 401) return { kind: 'signed-out' }
  if (status === 409) {
    const epoch = epochIn(body)
    if (epoch !== null) return { kind: 'other-epoch', epoch }
  }
  if (status === 400 || status === 422) return { kind: 'not-understood' }
  return { kind: 'busy', retryAfterSeconds: answer.retryAfterSeconds }
}

/** The epoch stands in the body itself, or in the `data` of an error that the server threw. */
function epochIn(body: object): string | null {
  const { epoch, data } = body as { epoch?: unknown, data?: { epoch?: unknown } | null }
  const found = epoch ?? data?.epoch
  return typeof found === 'string' ? found : null
}
