import { getRequestHeader, type H3Event } from 'h3'
import { MAX_BODY_BYTES } from '#shared/sync/protocol'
import { httpError } from './http-error'

const MAX_DEPTH = 12
const MAX_TEXT = 10_000

/**
 * The request's JSON, read with a limit while it streams: a body that is too long is refused before it is held in memory.
 *
 * @throws 413 beyond 1 MiB, 400 where it is no JSON, 422 where it is nested too deep or holds a text that is too long
 */
export async function readJsonBody(event: H3Event): Promise<unknown> {
  const encoding = getRequestHeader(event, 'content-encoding')
  if (encoding !== undefined && encoding !== 'identity') throw httpError('compressed-body', 415)
  if (Number(getRequestHeader(event, 'content-length') ?? 0) > MAX_BODY_BYTES) throw httpError('too-large', 413)
  const text = await readText(event)
  let value: unknown
  try {
    value = JSON.parse(text)
  }
  catch {
    throw httpError('not-json', 400)
  }
  checkShape(value, 0)
  return value
}

async function readText(event: H3Event): Promise<string> {
  const chunks: Buffer[] = []
  let length = 0
  for await (const chunk of event.node.req as AsyncIterable<Buffer>) {
    length += chunk.length
    if (length > MAX_BODY_BYTES) throw httpError('too-large', 413)
    chunks.push(chunk)
  }
  return Buffer.concat(chunks).toString('utf8')
}

function checkShape(value: unknown, depth: number): void {
  if (depth > MAX_DEPTH) throw httpError('too-deep', 422)
  if (typeof value === 'string' && value.length > MAX_TEXT) throw httpError('text-too-long', 422)
  if (Array.isArray(value)) for (const item of value) checkShape(item, depth + 1)
  else if (value !== null && typeof value === 'object') for (const item of Object.values(value)) checkShape(item, depth + 1)
}
