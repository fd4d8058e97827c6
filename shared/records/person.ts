import * as z from 'zod'
import { lineSchema } from './base'

export const ROLES = ['technician', 'reviewer', 'administrator'] as const
export const roleSchema = z.enum(ROLES)
export type Role = z.infer<typeof roleSchema>

/** A colleague as phones and screens name them; the sign-in itself stays on the server. */
export const personSchema = z.object({
  name: lineSchema,
  roles: z.array(roleSchema),
  archived: z.boolean().default(false),
})
export type Person = z.infer<typeof personSchema>
