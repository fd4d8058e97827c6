import * as z from 'zod'
import { pullResponseSchema } from './protocol'
import { rowSchema } from './rows'

/** A page as a phone takes it: a row of a kind that this version does not know is kept for the version that does. */
export const phonePageSchema = pullResponseSchema.extend({ rows: z.array(rowSchema.extend({ t: z.string().min(1).max(40) })) })
export type PhonePage = z.infer<typeof phonePageSchema>
