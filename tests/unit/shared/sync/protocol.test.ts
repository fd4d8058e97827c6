import { createHash } from 'node:crypto'
import { expect, it } from 'vitest'
import * as z from 'zod'
import { RECORD_SCHEMAS } from '#shared/records/kinds'
import { SHEET_EVENTS } from '#shared/records/sheet-event'
import { operationSchema, SCHEMA_VERSION } from '#shared/sync/operations'
import { PROTOCOL_VERSION, pullQuerySchema, pullResponseSchema, pushRequestSchema, pushResponseSchema } from '#shared/sync/protocol'
import { canonicalJson } from '#shared/sync/same-value'

/** Fingerprint of a schema as JSON Schema, so that a change of shape is seen and a change of comment is not. */
function fingerprint(schemas: Record<string, z.ZodType>): string {
  const shapes = Object.entries(schemas).map(([name, schema]) => [name, z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' })])
  return createHash('sha256').update(canonicalJson(shapes)).digest('hex').slice(0, 16)
}

it('the requests and answers have the shape of their version', () => {
  expect(
    fingerprint({ pushRequestSchema, pushResponseSchema, pullQuerySchema, pullResponseSchema }),
    'The wire changed. If it was ever released, raise PROTOCOL_VERSION in shared/sync/protocol.ts, add a line to the history in SPEC.md, then update this fingerprint.',
  ).toBe('da965ed9f63bae8d')
  expect(PROTOCOL_VERSION).toBe(1)
})

it('operations and records have the shape of their version', () => {
  expect(
    fingerprint({ operationSchema, ...RECORD_SCHEMAS, ...SHEET_EVENTS }),
    'An operation or a record changed its shape. If it was ever released, raise SCHEMA_VERSION in shared/sync/operations.ts, add a line to the history in SPEC.md and an upcaster, then update this fingerprint.',
  ).toBe('b7b9884302953e47')
  expect(SCHEMA_VERSION).toBe(1)
})
