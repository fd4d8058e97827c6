import type { OperationDraft } from './commit'
import { commit } from './commit'
import type { FieldStore } from './field-store'

/** A difference below this is a slow tick or the clock being set to the network's time in small steps. */
export const JUMP_MILLISECONDS = 2000
const TICK_MILLISECONDS = 1000

/** Two readings of the wall clock and of the monotonic clock. */
export interface ClockPair { wallMilliseconds: number, monotonicMilliseconds: number }

/**
 * Whether the phone's clock was changed between two looks, in ms forward; null when it was not.
 * The monotonic clock stands still while a phone sleeps, so this only holds while the page was in sight all the time.
 */
export function clockJump(before: ClockPair, after: ClockPair): { wallMilliseconds: number, monotonicMilliseconds: number } | null {
  const wallMilliseconds = after.wallMilliseconds - before.wallMilliseconds
  const monotonicMilliseconds = after.monotonicMilliseconds - before.monotonicMilliseconds
  return Math.abs(wallMilliseconds - monotonicMilliseconds) > JUMP_MILLISECONDS ? { wallMilliseconds, monotonicMilliseconds } : null
}

/**
 * Looks at both clocks once a second while the page is in sight, and writes a jump down on every sheet that runs.
 * Raw times stay as they are.
 *
 * @param runningSheets ids of the sheets whose timer runs
 * @returns the function that ends the watch
 */
export function watchClock(store: FieldStore, runningSheets: () => readonly string[]): () => void {
  const { surroundings } = store
  const look = (): ClockPair => ({ wallMilliseconds: surroundings.now(), monotonicMilliseconds: surroundings.monotonic() })
  const isVisible = () => document.visibilityState !== 'hidden'
  let before: ClockPair | null = isVisible() ? look() : null

  const interval = setInterval(() => {
    if (!isVisible()) return
    const after = look()
    const jump = before && clockJump(before, after)
    before = after
    if (jump) void writeJump(store, runningSheets(), jump)
  }, TICK_MILLISECONDS)
  const forget = () => { before = isVisible() ? look() : null }
  document.addEventListener('visibilitychange', forget)
  return () => {
    clearInterval(interval)
    document.removeEventListener('visibilitychange', forget)
  }
}

/** One event on each running sheet, in one commit. */
export async function writeJump(store: FieldStore, sheets: readonly string[], jump: { wallMilliseconds: number, monotonicMilliseconds: number }): Promise<void> {
  const drafts = sheets.map((sheet): OperationDraft => ({
    kind: 'ev.add', object: sheet, sheet,
    body: { type: 'clock-jump', data: { ...jump }, corrects: null, reason: null },
  }))
  await commit(store, drafts)
}
