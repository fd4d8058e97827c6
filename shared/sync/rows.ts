import * as z from 'zod'
import { idSchema } from '#shared/records/base'

/** What phones pull: one shape for everything that merges. */
export const ROW_TYPES = ['obj', 'reg', 'ev', 'set', 'state', 'conflict', 'late'] as const
export type RowType = (typeof ROW_TYPES)[number]

export const rowSchema = z.object({
  t: z.enum(ROW_TYPES),
  id: z.string().min(1).max(200),
  /** The survey, or the organisation, whose people may see it. */
  scope: idSchema,
  /** The record it belongs to. */
  object: idSchema,
  ver: z.int().min(0),
  gone: z.boolean(),
  data: z.record(z.string(), z.unknown()),
})
export type Row = z.infer<typeof rowSchema>

/** A row as the merge writes it; the version is stamped when it is stored. */
export type RowChange = Omit<Row, 'ver'>

export interface ObjectData { type: string, parent: string | null, initial: Record<string, unknown>, op: string, author: string, dev: string, at: string, isWaiting?: boolean }
export interface RegisterData { key: string, value: unknown, op: string, hlc: string, author: string, dev: string, at: string, previous: PreviousValue | null, isWaiting?: boolean }
export interface PreviousValue { op: string, value: unknown, author: string, at: string }
export interface EventData {
  type: string
  data: Record<string, unknown>
  at: string
  enteredAt: string
  zone: string
  author: string
  by: { role: 'worker' | 'colleague', id: string | null, name: string | null } | null
  dev: string
  corrects: string | null
  reason: string | null
  offset: number | null
  mono: { page: string, milliseconds: number } | null
  void: { opId: string, reason: string, author: string, at: string } | null
  isWaiting?: boolean
}
export interface SetData { set: string, element: string, isPresent: boolean, meta: Record<string, unknown>, op: string, hlc: string, dev: string }
export interface StateData { state: string, revision: number, isFit: boolean | null, reason: string | null, author: string, at: string, transition: string, isWaiting?: boolean }
export interface ConflictValue { opId: string, value: unknown, author: string, at: string, dev: string }
export interface ConflictData { key: string, isOpen: boolean, values: ConflictValue[], closedBy: string | null }
export interface LateData { op: string, kind: string, body: unknown, reason: string, author: string, dev: string, at: string }

export const registerRowId = (object: string, key: string) => `${object}/${key}`
export const setRowId = (object: string, set: string, element: string) => `${object}/${set}/${element}`
