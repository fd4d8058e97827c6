import { getQuery, getRouterParams, type H3Event } from 'h3'
import type * as z from 'zod'
import { MAX_DEPTH, MAX_TEXT, shapeOf } from '#server/services/json-shape'
import { storable } from '#server/services/storable'
import { httpError } from './http-error'
import { readJsonBody } from './read-json-body'

function parse<S extends z.ZodType>(schema: S, input: unknown): z.output<S> {
  const { depth, longestText } = shapeOf(input)
  if (depth > MAX_DEPTH) throw httpError('too-deep', 422)
  if (longestText > MAX_TEXT) throw httpError('text-too-long', 422)
  return parseAny(schema, storable(input))
}

function parseAny<S extends z.ZodType>(schema: S, input: unknown): z.output<S> {
  const result = schema.safeParse(input)
  if (result.success) return result.data
  throw httpError('invalid-request', 422, { issues: result.error.issues.slice(0, 50).map(issue => ({ path: issue.path.map(String).join('.'), message: issue.message })) })
}

export async function readValidBody<S extends z.ZodType>(event: H3Event, schema: S): Promise<z.output<S>> {
  return parse(schema, await readJsonBody(event))
}

/** A push: its operations are measured one by one where they are received, because one of them must not stop the others. */
export async function readPushBody<S extends z.ZodType>(event: H3Event, schema: S): Promise<z.output<S>> {
  const body = await readJsonBody(event)
  if (body === null || typeof body !== 'object' || Array.isArray(body)) return parse(schema, body)
  const { ops, ...envelope } = body as Record<string, unknown>
  const { depth, longestText } = shapeOf(envelope)
  if (depth > MAX_DEPTH || longestText > MAX_TEXT) return parse(schema, envelope)
  return parseAny(schema, { ...storable(envelope), ops })
}

export function readValidQuery<S extends z.ZodType>(event: H3Event, schema: S): z.output<S> {
  return parse(schema, getQuery(event))
}

export function readValidParams<S extends z.ZodType>(event: H3Event, schema: S): z.output<S> {
  return parse(schema, getRouterParams(event))
}
