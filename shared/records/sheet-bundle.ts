import type { Agent } from './agent'
import type { Calibrator } from './calibrator'
import type { Limit } from './limit'
import type { Method } from './method'
import type { Pump } from './pump'
import type { Sampler } from './sampler'
import type { Settings } from './settings'
import type { Sheet } from './sheet'
import type { SheetEvent } from './sheet-event'
import type { SheetState } from './sheet-state'
import type { Survey } from './survey'
import type { Worker } from './worker'

/** A record with its identity. */
export type Identified<R> = R & { id: string }

/** Two phones set one field without knowing of each other: both values stay, a person looks. */
export interface FieldConflict {
  field: string
  isOpen: boolean
  values: { opId: string, value: unknown, author: string, at: string, dev: string, isCurrent: boolean }[]
}

/** A change that came after the sheet was locked, or that could not be applied: received, kept, shown beside the sheet. */
export interface LateChange {
  opId: string
  reason: string
  author: string
  dev: string
  at: string
  kind: string
  body: unknown
}

/** Where a sheet stands in the office's half of its life. */
export interface SheetStanding {
  state: SheetState
  /** Counts every step; a step names the one it was decided on. */
  revision: number
  /** As handed in: fit to use, or not fit with the reason. */
  isFit: boolean | null
  reason: string | null
  author: string | null
  at: string | null
  /** The step waits on this phone to be sent. */
  isWaiting: boolean
}

/** Who last set a field, when, and on which phone. */
export interface FieldOrigin { opId: string, author: string, at: string, dev: string, isWaiting: boolean }

/** One sheet with all that was written on it. */
export interface SheetDocument {
  id: string
  surveyId: string
  sheet: Sheet
  origins: Partial<Record<keyof Sheet, FieldOrigin>>
  events: SheetEvent[]
  standing: SheetStanding
  conflicts: FieldConflict[]
  late: LateChange[]
  createdAt: string
  createdBy: string
}

/** What the rest of the survey says that matters to one sheet: numbers used twice, pumps on two sheets, blanks. */
export interface Sibling {
  id: string
  number: string | null
  kind: Sheet['kind']
  workerId: string | null
  agentIds: readonly string[]
  methodId: string | null
  mediumLot: string | null
  sharesPump: boolean
  state: SheetState
  /** Spans in which each pump drew air; `toAt` null while it runs. */
  spans: readonly { pumpId: string | null, fromAt: string, toAt: string | null }[]
}

/** Everything `assessSheet` looks at; a missing record is null or absent and becomes a finding or a gap, never an error. */
export interface SheetBundle {
  document: SheetDocument
  survey: Identified<Survey> | null
  worker: Identified<Worker> | null
  method: Identified<Method> | null
  sampler: Identified<Sampler> | null
  agents: readonly Identified<Agent>[]
  limits: readonly Identified<Limit>[]
  pumps: Readonly<Record<string, Identified<Pump>>>
  calibrators: Readonly<Record<string, Identified<Calibrator>>>
  siblings: readonly Sibling[]
  settings: Settings
}
