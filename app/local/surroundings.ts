import { uuidv7 } from 'uuidv7'

/** What the phone knows of the world: passed in, so that a test can be the world. */
export interface Surroundings {
  /** The phone's wall clock, ms. */
  now: () => number
  /** IANA zone of the phone. */
  zone: () => string
  /** This page's life; the monotonic clock counts within it, ms. */
  page: string
  monotonic: () => number
  newId: () => string
}

export function browserSurroundings(): Surroundings {
  return {
    now: () => Date.now(),
    zone: () => Intl.DateTimeFormat().resolvedOptions().timeZone || 'UTC',
    page: uuidv7(),
    monotonic: () => performance.now(),
    newId: () => uuidv7(),
  }
}

export function instantOf(milliseconds: number): string {
  return new Date(milliseconds).toISOString()
}
