/** Why something failed, for the log: the driver's own words. Drizzle's repeat the statement with what people wrote. */
export function reasonOf(error: unknown): string {
  if (!(error instanceof Error)) return String(error)
  return error.cause instanceof Error ? error.cause.message : error.message.split('\n')[0]!.slice(0, 300)
}
