/**
 * The closed list of answers to an operation. Each one says "durably received"; only a failed request leaves the
 * operation in the outbox. An outcome that a phone does not know means: keep it and show it.
 */
export const OUTCOMES = ['ok', 'dup', 'conflict', 'held', 'parked', 'refused'] as const
export type Outcome = (typeof OUTCOMES)[number]

/** Why an operation is held (received, kept, not applied). */
export const HELD_REASONS = ['locked', 'no-access', 'not-allowed', 'unknown-object', 'unknown-event', 'invalid', 'id-reused', 'revoked', 'error', 'malformed'] as const
export type HeldReason = (typeof HELD_REASONS)[number]

/** Why a step in a sheet's life was refused. */
export const REFUSED_REASONS = ['stale-state', 'not-from-here', 'needs-reason', 'stop-findings', 'not-allowed'] as const
export type RefusedReason = (typeof REFUSED_REASONS)[number]
