import * as z from 'zod'

/** Identity of a record, made on the phone that creates it: UUID. */
export const idSchema = z.uuid()

/** An instant as ISO 8601 UTC text with milliseconds at most: `2026-03-03T07:02:11.250Z`. */
export const instantSchema = z.iso.datetime()

/** A calendar day, `2026-12-01`. */
export const daySchema = z.iso.date()

/** IANA time zone of the place, `Europe/Dublin`. */
export const zoneSchema = z.string().min(1).max(64)

/** One line of text as a person typed it. */
export const lineSchema = z.string().max(500)

/** Several lines of text as a person typed them. */
export const textSchema = z.string().max(10_000)

/** How far a stored trade value can be trusted; shown beside the value. */
export const SOURCE_STATUSES = ['verified', 'recomputed', 'secondary', 'memory'] as const
export const sourceStatusSchema = z.enum(SOURCE_STATUSES)
export type SourceStatus = z.infer<typeof sourceStatusSchema>

/** A number that is a measure: finite, never NaN. */
export const measureSchema = z.number()

/** A flow in L/min: above 0 and below what any sampling pump moves. */
export const flowSchema = z.number().positive().max(1000)

/** A flow as it was read, L/min: 0 is a reading too, of a pump that stands still. */
export const readFlowSchema = z.number().min(0).max(1000)
