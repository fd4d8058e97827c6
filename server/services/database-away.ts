/** Codes of PostgreSQL and the network that mean: the database is away or asks to try again. */
const AWAY = /^(08|53|57|40001|40P01)|^E(CONN|TIMEDOUT|PIPE|HOSTUNREACH)/

/** Whether the same request is worth sending again in a moment, because only the database was not there for it. */
export function isDatabaseAway(error: unknown): boolean {
  for (let cause: unknown = error; cause instanceof Error; cause = cause.cause) {
    const code = 'code' in cause ? String(cause.code) : ''
    if (AWAY.test(code) || /Connection terminated|timeout exceeded when trying to connect/.test(cause.message)) return true
  }
  return false
}
