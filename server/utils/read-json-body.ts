import { getRequestHeader, type H3Event } from 'h3'
import { MAX_BODY_BYTES } from '#shared/sync/protocol'
import { httpError } from './http-error'

/**
 * The request's JSON, read with a limit while it streams: a body that is too long is refused before it is held in memory.
 *
 * @throws 413 beyond 1 MiB, 415 where it is compressed, 400 where it is no JSON
 */
export async function readJsonBody(event: H3Event): Promise<unknown> {
  const encoding = getRequestHeader(event, 'content-encoding')
  if (encoding !== undefined && encoding !== 'identity') throw httpError('compressed-body', 415)
  if (Number(getRequestHeader(event, 'content-length') ?? 0) > MAX_BODY_BYTES) throw httpError('too-large', 413)
  const text = await readText(event)
  try {
    return JSON.parse(text)
  }
  catch {
    throw httpError('not-json', 400)
  }
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
