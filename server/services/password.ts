import { Scrypt } from '@adonisjs/hash/drivers/scrypt'

/** OWASP's cost for scrypt: N = 2^17, r = 8, p = 1, which takes 128 MiB a hash. */
const scrypt = new Scrypt({ cost: 131_072, blockSize: 8, parallelization: 1, maxMemory: 150_994_944 })

/** At most two at once: each takes 128 MiB and most of a second. */
const AT_ONCE = 2
let running = 0
const queue: (() => void)[] = []

async function inTurn<T>(work: () => Promise<T>): Promise<T> {
  if (running >= AT_ONCE) await new Promise<void>(resolve => queue.push(resolve))
  else running++
  try {
    return await work()
  }
  finally {
    // Whoever waits takes this turn over; only when nobody does is it free for the next who comes.
    const next = queue.shift()
    if (next) next()
    else running--
  }
}

export function makePasswordHash(password: string): Promise<string> {
  return inTurn(() => scrypt.make(password))
}

let dummy: Promise<string> | undefined

/** Whether the password fits; for an unknown account the same work is done and the answer is no. */
export async function checkPassword(hash: string | null, password: string): Promise<boolean> {
  dummy ??= makePasswordHash('nobody has this password')
  const compared = await inTurn(async () => scrypt.verify(hash ?? await dummy!, password))
  return hash !== null && compared
}
