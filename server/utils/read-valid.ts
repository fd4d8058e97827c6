import { getQuery, getRouterParams, type H3Event } from 'h3'
import type * as z from 'zod'
import { httpError } from './http-error'
import { readJsonBody } from './read-json-body'

function parse<S extends z.ZodType>(schema: S, input: unknown): z.output<S> {
  const result = schema.safeParse(input)
  if (result.success) return result.data
  throw httpError('invalid-request', 422, { issues: result.error.issues.slice(0, 50).map(issue => ({ path: issue.path.map(String).join('.'), message: issue.message })) })
}

export async function readValidBody<S extends z.ZodType>(event: H3Event, schema: S): Promise<z.output<S>> {
  return parse(schema, await readJsonBody(event))
}

export function readValidQuery<S extends z.ZodType>(event: H3Event, schema: S): z.output<S> {
  return parse(schema, getQuery(event))
}

export function readValidParams<S extends z.ZodType>(event: H3Event, schema: S): z.output<S> {
  return parse(schema, getRouterParams(event))
}
