/** A request that is refused for a reason with a code; the API turns it into its answer. */
export class Refusal extends Error {
  constructor(readonly code: string, readonly status: number, readonly more: Record<string, unknown> = {}) {
    super(code)
  }
}
