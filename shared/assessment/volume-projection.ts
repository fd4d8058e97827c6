import { instantText, isReachable } from '#shared/domain/instant'
import { projectVolume } from '#shared/domain/projection'
import { passedAt, type SegmentFacts } from './flow-segments'
import type { SheetAssessment } from './sheet-assessment'
import type { VolumeRange } from './volume-range'

export interface ProjectionFacts {
  segments: readonly SegmentFacts[]
  range: VolumeRange
  volumeLitres: number | null
  /** Flow from now on, L/min; null when nothing draws or it is not known. */
  litresPerMinute: number | null
  isOpen: boolean
  nowAt: string
  now: number
  plannedEndAt: string | null
}

/**
 * When the volume passes the minimum and the maximum: the instant it did, walking the segments, or while the sample is open
 * the instant it will if the pump draws on from now without a pause.
 *
 * @returns null when there is no volume yet
 */
export function volumeProjection(facts: ProjectionFacts): SheetAssessment['projection'] {
  const { segments, range, volumeLitres, litresPerMinute, isOpen, now, nowAt, plannedEndAt } = facts
  if (volumeLitres === null) return null
  const ahead = isOpen && litresPerMinute !== null
    ? projectVolume({ litresSoFar: volumeLitres, litresPerMinute, minimumLitres: range.minimumLitres, maximumLitres: range.maximumLitres, nowAt, plannedEndAt })
    : null
  const markAt = (litres: number | null, mark: { reached: boolean, at?: string | null } | null | undefined) => {
    if (litres === null) return null
    const passed = passedAt(segments, litres, now)
    if (passed !== null) return isReachable(passed) ? instantText(passed) : null
    return mark && !mark.reached ? mark.at ?? null : null
  }
  return {
    minimumAt: markAt(range.minimumLitres, ahead?.minimum),
    maximumAt: markAt(range.maximumLitres, ahead?.maximum),
    litresAtPlannedEnd: ahead?.litresAtPlannedEnd ?? null,
  }
}
