import { requireAbove, requireAtLeast } from './check'
import { instantMilliseconds, instantText, isReachable } from './instant'

const MILLISECONDS_IN_MINUTE = 60_000

export interface ProjectionInput {
  /** volume drawn up to now, L, 0 or more */
  litresSoFar: number
  /** flow from now on, L/min, 0 or more */
  litresPerMinute: number
  /** least volume of the method, L, 0 or more */
  minimumLitres?: number | null
  /** largest volume of the method, L, above 0 */
  maximumLitres?: number | null
  /** the instant at which the volume so far holds, ISO 8601 with zone */
  nowAt: string
  /** when the sample is planned to stop, ISO 8601 with zone */
  plannedEndAt?: string | null
}

export type VolumeMark
  = | { litres: number, reached: true }
    | {
      litres: number
      reached: false
      /** minutes of air still to draw; null when the pump draws nothing */
      minutesLeft: number | null
      /** when that will be if the pump runs on without a pause; null when it never will */
      at: string | null
    }

export interface Projection {
  /** null without a minimum */
  minimum: VolumeMark | null
  /** null without a maximum */
  maximum: VolumeMark | null
  /** volume when stopping as planned, L; the volume so far when that time is past; null without a planned end */
  litresAtPlannedEnd: number | null
}

/**
 * Minutes of air it takes to draw a volume.
 *
 * @param targetLitres volume wanted, L, 0 or more
 * @param flowLitresPerMinute flow, L/min, above 0
 * @returns minutes, not rounded
 * @throws RangeError when a value is outside its range
 * @source t = V / Q
 * @example minutesToVolume(8, 0.05) // 160
 */
export function minutesToVolume(targetLitres: number, flowLitresPerMinute: number): number {
  requireAtLeast('minutesToVolume', 'targetLitres', targetLitres, 0)
  requireAbove('minutesToVolume', 'flowLitresPerMinute', flowLitresPerMinute, 0)
  return targetLitres / flowLitresPerMinute
}

/**
 * Where a running sample is going: when its volume passes the minimum and the maximum, and what it will be at the planned end.
 *
 * It assumes that the pump draws on with the same flow and without a pause from now. A volume that is reached already has no
 * instant here: pauses may lie in between, so only the events can tell when that was.
 *
 * @param input volumes in L, flow in L/min, instants; see the fields
 * @returns the marks and the volume at the planned end
 * @throws RangeError when a number is outside its range or a text is not an instant
 * @source t = V / Q
 * @example projectVolume({ litresSoFar: 100, litresPerMinute: 2, minimumLitres: 400, nowAt: '2026-07-03T08:00:00Z' })
 *   // { minimum: { minutesLeft: 150, at: '2026-07-03T10:30:00.000Z' } }
 */
export function projectVolume(input: ProjectionInput): Projection {
  const { litresSoFar, litresPerMinute, minimumLitres, maximumLitres, nowAt, plannedEndAt } = input
  requireAtLeast('projectVolume', 'litresSoFar', litresSoFar, 0)
  requireAtLeast('projectVolume', 'litresPerMinute', litresPerMinute, 0)
  if (minimumLitres != null) requireAtLeast('projectVolume', 'minimumLitres', minimumLitres, 0)
  if (maximumLitres != null) requireAbove('projectVolume', 'maximumLitres', maximumLitres, 0)
  const now = instantMilliseconds(nowAt, 'projectVolume')
  const plannedEnd = plannedEndAt == null ? null : instantMilliseconds(plannedEndAt, 'projectVolume')
  return {
    minimum: minimumLitres == null ? null : markFor(minimumLitres, litresSoFar, litresPerMinute, now),
    maximum: maximumLitres == null ? null : markFor(maximumLitres, litresSoFar, litresPerMinute, now),
    litresAtPlannedEnd: plannedEnd === null
      ? null
      : litresSoFar + litresPerMinute * Math.max(0, plannedEnd - now) / MILLISECONDS_IN_MINUTE,
  }
}

function markFor(litres: number, litresSoFar: number, litresPerMinute: number, now: number): VolumeMark {
  if (litresSoFar >= litres) return { litres, reached: true }
  if (litresPerMinute === 0) return { litres, reached: false, minutesLeft: null, at: null }
  const minutesLeft = minutesToVolume(litres - litresSoFar, litresPerMinute)
  const reachedAt = now + minutesLeft * MILLISECONDS_IN_MINUTE
  return { litres, reached: false, minutesLeft, at: isReachable(reachedAt) ? instantText(reachedAt) : null }
}
