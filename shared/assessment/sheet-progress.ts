import type { Air } from '#shared/records/sheet'
import type { RunTimeline } from './run-timeline'
import type { Progress } from './sheet-assessment'

export interface ProgressInput {
  air: Air
  timeline: Pick<RunTimeline, 'state'>
  hasFlowBefore: boolean
  hasFlowAfter: boolean
  hasNumber: boolean
}

/**
 * The technician's half of a sheet's life, from its events.
 *
 * A diffusive sampler has no flow to read: it is ready with its number and checked once it is stopped. A blank, bulk or wipe is
 * done with its number; where it was opened and capped with the timer, once it is capped.
 */
export function sheetProgress({ air, timeline, hasFlowBefore, hasFlowAfter, hasNumber }: ProgressInput): Progress {
  if (timeline.state === 'running' || timeline.state === 'paused') return timeline.state
  if (timeline.state === 'stopped') return air !== 'pumped' || hasFlowAfter ? 'checked' : 'stopped'
  if (air === 'pumped') return hasFlowBefore ? 'ready' : 'planned'
  if (!hasNumber) return 'planned'
  return air === 'diffusive' ? 'ready' : 'checked'
}
