import * as z from 'zod'
import type { Actor } from '#shared/access/policy'
import { MAX_OPERATIONS, pushRequestSchema, type PushResponse } from '#shared/sync/protocol'
import type { Transaction } from '#server/database/client'
import { OFFICE_DEVICE } from './apply-office'
import { applyReceived } from './apply-push'
import { isDatabaseAway } from './database-away'
import { asText, readOperation, type Received } from './read-operation'
import { reasonOf } from './reason-of'
import { Refusal } from './refusal'

/** A push as it is read at the door: what the phone says of itself is checked, each operation is read for itself. */
export const pushAtTheDoorSchema = pushRequestSchema.extend({
  dev: pushRequestSchema.shape.dev.refine(dev => dev !== OFFICE_DEVICE, 'This name is the office\'s own.'),
  ops: z.array(z.unknown()).max(MAX_OPERATIONS),
})

type InTransaction = <T>(work: (tx: Transaction) => Promise<T>) => Promise<T>

/**
 * Receives a push. Normally in one transaction; where a batch fails for a reason that lies in one of its operations, each
 * gets a transaction of its own, and the one that fails again is kept as text and held (PUSH5, PUSH6).
 *
 * @param inTransaction runs work in one transaction of the actor's organisation
 * @returns the answer; an operation that could not even be kept as text is left out of it and so stays on the phone
 */
export async function receivePush(inTransaction: InTransaction, actor: Actor, request: z.infer<typeof pushAtTheDoorSchema>, now: Date): Promise<PushResponse> {
  const { ops, ...envelope } = request
  const batch = ops.map(readOperation)
  const push = (some: readonly Received[]) => inTransaction(tx => applyReceived(tx, actor, envelope, some, now))
  try {
    return await push(batch)
  }
  catch (error) {
    if (!isOfTheBatch(error) || batch.length === 0) throw error
    console.error(`A batch of ${batch.length} operations failed and is received one by one: ${reasonOf(error)}`)
  }

  const answers: PushResponse[] = []
  for (const received of [...batch].sort((a, b) => a.loose.n - b.loose.n)) {
    const answer = await push([received])
      .catch((error) => {
        if (!isOfTheBatch(error)) throw error
        console.error(`Operation ${received.loose.id} failed and is held: ${reasonOf(error)}`)
        return push([asText(received)])
      })
      .catch((error) => {
        if (!isOfTheBatch(error)) throw error
        console.error(`Operation ${received.loose.id} could not be received: ${reasonOf(error)}`)
        return null
      })
    if (answer) answers.push(answer)
  }
  const last = answers.at(-1)
  if (!last) throw new Error('No operation of the batch could be received.')
  return { ...last, fork: answers.some(answer => answer.fork), res: answers.flatMap(answer => answer.res) }
}

function isOfTheBatch(error: unknown): boolean {
  return !(error instanceof Refusal) && !isDatabaseAway(error)
}
