import type { Working } from '#shared/domain/working'
import type { SheetEventOf } from '#shared/records/sheet-event'
import type { RibbonInput } from './ribbon'

/** The technician's half of a sheet's life, derived from its events. */
export const PROGRESS = ['planned', 'ready', 'running', 'paused', 'stopped', 'checked'] as const
export type Progress = (typeof PROGRESS)[number]

export const SEVERITIES = ['note', 'attention', 'stop'] as const
/** `attention` is answered with a reason; `stop` means: not as fit. Neither ever stops a record from being sent. */
export type Severity = (typeof SEVERITIES)[number]

/** The part of the sheet's page where a finding or a gap is mended. */
export const SHEET_PARTS = ['set-up', 'flow-before', 'air', 'flow-after', 'close'] as const
export type SheetPart = (typeof SHEET_PARTS)[number]

export interface Finding {
  /** Kebab-case, from the closed list in `findings/codes.ts`. */
  code: string
  severity: Severity
  /** What it is about, when a code can stand more than once on a sheet: an event's or another sheet's id, else ''. */
  subject: string
  part: SheetPart
  /** One short sentence. */
  title: string
  /** What to do now. */
  whatNow: string
  /** The numbers behind it. */
  numbers: { name: string, value: number | string, unit: string }[]
  /** The rule in words, and where it comes from. */
  rule: string
  source: string
  answer: { reason: string, author: string, at: string } | null
}

/** Something that is not there yet; a sheet with gaps can be handed in as not fit at any time. */
export interface Gap { code: string, part: SheetPart, title: string }

export interface FlowSummary {
  pumpId: string
  readings: SheetEventOf<'flow-reading'>[]
  meanLitresPerMinute: number
  spreadPercent: number
}

export interface CheckSummary {
  event: SheetEventOf<'flow-check'>
  /** The flow it is compared with: read before, or set in mid-run; null when neither is known. */
  setLitresPerMinute: number | null
  /** As read; for a rotameter at the conditions of sampling, where they are known. Null when no flow was read. */
  litresPerMinute: number | null
  isCorrected: boolean
  /** Away from the flow that was set, in percent of it; null when no flow was read. */
  percent: number | null
  verdict: 'within' | 'attention' | 'stop' | null
}

/** What was read of one pump. The means are as read; `change` and the flow used are of `beforeFlow` and `afterFlow`. */
export interface PumpFlows {
  pumpId: string
  before: FlowSummary | null
  after: FlowSummary | null
  /** As read, or at the conditions of sampling for a rotameter whose conditions are known. */
  beforeLitresPerMinute: number | null
  afterLitresPerMinute: number | null
  isCorrected: boolean
}

/** A stretch of the run with one pump at one setting. */
export interface FlowSegment {
  pumpId: string | null
  fromAt: string
  toAt: string
  minutes: number
  /** Null when nothing was read of its pump: then there is no volume either. */
  litresPerMinute: number | null
  /** Which flow stands for the segment and why. */
  rule: string
  litres: number | null
}

export interface SheetAssessment {
  progress: Progress
  startedAt: string | null
  stoppedAt: string | null
  /** Air drawn, and pauses; the last of each may be open. */
  spans: { fromAt: string, toAt: string | null, pumpId: string | null }[]
  pauses: { fromAt: string, toAt: string | null, reason: string | null, eventId: string }[]
  /** Up to now while it runs. */
  sampledMinutes: number | null
  /** The pump that draws now or drew last. */
  currentPumpId: string | null
  /** Of the current pump; `pumps` has every pump's. */
  flowBefore: FlowSummary | null
  flowAfter: FlowSummary | null
  pumps: PumpFlows[]
  /** Change of flow, (after - before) / before, of the pump that was read both times. */
  change: { percent: number, verdict: 'within' | 'attention' | 'stop' } | null
  flowUsed: { litresPerMinute: number, rule: 'mean' | 'lower' | 'nominal' | 'before-only' | 'after-only', why: string } | null
  indicatorAccuracy: { percent: number, litresPerMinute: number } | null
  segments: FlowSegment[]
  /** Null until there is a flow and a start, or an uptake rate and a start. */
  volumeLitres: number | null
  /** The range that applies: the method's, or the agent's within it. */
  volumeRange: { minimumLitres: number | null, maximumLitres: number | null, from: string, status: string }
  projection: { minimumAt: string | null, maximumAt: string | null, litresAtPlannedEnd: number | null } | null
  checks: CheckSummary[]
  nextCheckDueAt: string | null
  /** Share of the planned shift in which air was drawn, 0 to 1. */
  coverageShare: number | null
  findings: Finding[]
  gaps: Gap[]
  canHandInAsFit: boolean
  /** Every computed number explains itself; see `WORKING_KEYS`. */
  workings: Partial<Record<WorkingKey, Working>>
  ribbon: RibbonInput
}

export const WORKING_KEYS = ['mean-before', 'mean-after', 'change', 'correction', 'flow-used', 'minutes', 'volume', 'accuracy', 'projection', 'coverage'] as const
export type WorkingKey = (typeof WORKING_KEYS)[number]
