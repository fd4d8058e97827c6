import type { SheetEventOf } from '#shared/records/sheet-event'
import type { Placed, PlacedEvents } from './placed-events'

/** A stretch of drawn air with one pump at one setting; `to` is null while it still runs. Milliseconds since 1970. */
export interface Stretch {
  pumpId: string | null
  /** Id of the flow reset that made the setting, '' for the flow read before the run. */
  settingId: string
  from: number
  to: number | null
}

export interface RunPause { from: number, to: number | null, reason: string | null, eventId: string }

export const IRREGULARITIES = [
  'start-again', 'pause-while-paused', 'resume-without-pause', 'before-start', 'stop-before-start', 'after-stop', 'other-pump',
] as const
/** What a timer, swap or reset event did that does not fit the run. It stays; the run is computed without it. */
export type Irregularity = (typeof IRREGULARITIES)[number]

type RunEventType = 'timer' | 'pump-swap' | 'flow-reset'
export interface IrregularEvent { what: Irregularity, placed: Placed<RunEventType> }

export interface RunTimeline {
  state: 'not-started' | 'running' | 'paused' | 'stopped'
  startedAt: number | null
  stoppedAt: number | null
  /** The start and the stop that count. */
  startEvent: SheetEventOf<'timer'> | null
  stopEvent: SheetEventOf<'timer'> | null
  stretches: readonly Stretch[]
  pauses: readonly RunPause[]
  /** The pump that draws now or drew last. */
  pumpId: string | null
  /** The swaps that took effect. */
  swaps: readonly Placed<'pump-swap'>[]
  irregular: readonly IrregularEvent[]
  /** The run was stopped out of a pause that was never ended. */
  wasPausedAtStop: boolean
}

/**
 * The run of a sheet from its events.
 *
 * The first start begins it, the first stop after that ends it (TIMER1); whatever stands later stays on record and is listed
 * as irregular. A stop that stands before the only start ends a run without a minute. Nothing here throws: a resume without a
 * pause, a pause while paused or a second start changes nothing and is listed.
 *
 * @param events the standing events in order
 * @param sheetPumpId the sheet's pump, used when the start names none
 */
export function runTimeline(events: PlacedEvents, sheetPumpId: string | null): RunTimeline {
  const run = new RunBuilder(sheetPumpId)
  for (const placed of events.all) {
    const { type } = placed.event
    if (type === 'timer') run.timer(placed as Placed<'timer'>)
    else if (type === 'pump-swap') run.swap(placed as Placed<'pump-swap'>)
    else if (type === 'flow-reset') run.reset(placed as Placed<'flow-reset'>)
  }
  return run.finish()
}

class RunBuilder {
  private state: RunTimeline['state'] = 'not-started'
  private startedAt: number | null = null
  private stoppedAt: number | null = null
  private startEvent: SheetEventOf<'timer'> | null = null
  private stopEvent: SheetEventOf<'timer'> | null = null
  private earlyStop: Placed<'timer'> | null = null
  private wasPausedAtStop = false
  private readonly stretches: Stretch[] = []
  private readonly pauses: RunPause[] = []
  private readonly swaps: Placed<'pump-swap'>[] = []
  private readonly irregular: IrregularEvent[] = []
  private readonly settingOf = new Map<string, string>()

  constructor(private pumpId: string | null) {}

  timer(placed: Placed<'timer'>): void {
    const { action, pumpId } = placed.event.data
    if (this.state === 'stopped') return this.odd('after-stop', placed)
    if (action === 'start') return this.start(placed)
    if (this.state === 'not-started') {
      if (action === 'stop') this.earlyStop = placed
      return this.odd(action === 'stop' ? 'stop-before-start' : 'before-start', placed)
    }
    if (pumpId !== null && pumpId !== this.pumpId) this.odd('other-pump', placed)
    if (action === 'pause') this.pause(placed)
    else if (action === 'resume') this.resume(placed)
    else this.stop(placed)
  }

  swap(placed: Placed<'pump-swap'>): void {
    const { fromPumpId, pumpId } = placed.event.data
    if (this.state === 'stopped') return this.odd('after-stop', placed)
    if (this.state === 'not-started') return this.odd('before-start', placed)
    if (fromPumpId !== this.pumpId) this.odd('other-pump', placed)
    this.swaps.push(placed)
    this.splitAt(placed.at, pumpId)
  }

  reset(placed: Placed<'flow-reset'>): void {
    const { pumpId } = placed.event.data
    if (this.state === 'stopped') return this.odd('after-stop', placed)
    this.settingOf.set(pumpId, placed.event.id)
    if (this.state === 'not-started') return
    if (pumpId === this.pumpId) this.splitAt(placed.at, pumpId)
    else this.odd('other-pump', placed)
  }

  finish(): RunTimeline {
    // The only stop stands before the start: the run is over and no air was drawn in it, as far as the times say.
    if (this.earlyStop && (this.state === 'running' || this.state === 'paused')) {
      this.state = 'stopped'
      this.stoppedAt = this.earlyStop.at
      this.stopEvent = this.earlyStop.event
      this.stretches.length = 0
      this.pauses.length = 0
    }
    return {
      state: this.state, startedAt: this.startedAt, stoppedAt: this.stoppedAt, startEvent: this.startEvent, stopEvent: this.stopEvent,
      stretches: this.stretches, pauses: this.pauses, pumpId: this.pumpId, swaps: this.swaps, irregular: this.irregular,
      wasPausedAtStop: this.wasPausedAtStop,
    }
  }

  private start(placed: Placed<'timer'>): void {
    if (this.state !== 'not-started') return this.odd('start-again', placed)
    this.state = 'running'
    this.startedAt = placed.at
    this.startEvent = placed.event
    this.pumpId = placed.event.data.pumpId ?? this.pumpId
    this.open(placed.at)
  }

  private pause(placed: Placed<'timer'>): void {
    if (this.state === 'paused') return this.odd('pause-while-paused', placed)
    this.state = 'paused'
    this.close(placed.at)
    this.pauses.push({ from: placed.at, to: null, reason: placed.event.data.reason, eventId: placed.event.id })
  }

  private resume(placed: Placed<'timer'>): void {
    if (this.state !== 'paused') return this.odd('resume-without-pause', placed)
    this.state = 'running'
    this.endPause(placed.at)
    // A resume that names another pump is the only trace of a swap that nobody wrote down: believed, and listed above.
    this.pumpId = placed.event.data.pumpId ?? this.pumpId
    this.open(placed.at)
  }

  private stop(placed: Placed<'timer'>): void {
    if (this.state === 'paused') {
      this.wasPausedAtStop = true
      this.endPause(placed.at)
    }
    else this.close(placed.at)
    this.state = 'stopped'
    this.stoppedAt = placed.at
    this.stopEvent = placed.event
  }

  private splitAt(at: number, pumpId: string): void {
    if (this.state === 'running') this.close(at)
    this.pumpId = pumpId
    if (this.state === 'running') this.open(at)
  }

  private open(at: number): void {
    const settingId = this.pumpId === null ? '' : this.settingOf.get(this.pumpId) ?? ''
    this.stretches.push({ pumpId: this.pumpId, settingId, from: at, to: null })
  }

  private close(at: number): void {
    const last = this.stretches.at(-1)
    if (last) last.to = at
  }

  private endPause(at: number): void {
    const last = this.pauses.at(-1)
    if (last) last.to = at
  }

  private odd(what: Irregularity, placed: Placed<RunEventType>): void {
    this.irregular.push({ what, placed })
  }
}

/**
 * Minutes in which one pump, or any, drew air up to an instant.
 *
 * @param timeline the run
 * @param untilAt milliseconds since 1970
 * @param pumpId only this pump; every pump when left out
 */
export function drawnMinutesUntil(timeline: RunTimeline, untilAt: number, pumpId?: string): number {
  let milliseconds = 0
  for (const stretch of timeline.stretches) {
    if (pumpId !== undefined && stretch.pumpId !== pumpId) continue
    milliseconds += Math.max(0, Math.min(stretch.to ?? untilAt, untilAt) - stretch.from)
  }
  return milliseconds / 60_000
}
