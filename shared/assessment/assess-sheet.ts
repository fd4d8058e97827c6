import { accuracyPercentAt } from '#shared/domain/indicator-accuracy'
import { flowUsed } from '#shared/domain/flow-used'
import { instantText } from '#shared/domain/instant'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import { findAll } from './findings/all'
import { NON_BLOCKING_CODES } from './findings/codes'
import { flowChoiceOf, flowRuleInWords } from './flow-segments'
import { findGaps } from './gaps'
import { ribbonOf } from './ribbon-of'
import type { Finding, Gap, SheetAssessment } from './sheet-assessment'
import { sheetFacts, type SheetFacts } from './sheet-facts'
import { sheetProgress } from './sheet-progress'
import { currentChange, indicatedFlow, sheetWorkings } from './sheet-workings'

/**
 * A sheet and all that belongs to it, read into numbers, gaps and findings. The phone, the office, the print and the export
 * call this one function.
 *
 * @param bundle the sheet with the records it names; what is missing becomes a gap or a finding, never an error
 * @param nowAt the instant it is looked at, ISO 8601; the only clock there is here
 * @returns the sheet as it stands at that instant
 */
export function assessSheet(bundle: SheetBundle, nowAt: string): SheetAssessment {
  const facts = sheetFacts(bundle, nowAt)
  const { timeline, sheet, air } = facts
  const current = facts.pumpId === null ? undefined : facts.flows.get(facts.pumpId)
  const pauses = timeline.pauses.map(({ from, to, reason, eventId }) => (
    { fromAt: instantText(from), toAt: to === null ? null : instantText(to), reason, eventId }
  ))
  const findings = findAll(facts)
  const gaps = findGaps(facts)

  return {
    progress: sheetProgress({
      air, timeline,
      hasFlowBefore: current?.before != null,
      hasFlowAfter: current?.after != null,
      hasNumber: !!sheet.number?.trim(),
    }),
    startedAt: timeline.startedAt === null ? null : instantText(timeline.startedAt),
    stoppedAt: timeline.stoppedAt === null ? null : instantText(timeline.stoppedAt),
    spans: facts.spans,
    pauses,
    sampledMinutes: facts.sampledMinutes,
    currentPumpId: facts.pumpId,
    flowBefore: current?.before ?? null,
    flowAfter: current?.after ?? null,
    pumps: [...facts.flows.values()].map(({ pumpId, before, after, beforeLitresPerMinute, afterLitresPerMinute, isCorrected }) => (
      { pumpId, before, after, beforeLitresPerMinute, afterLitresPerMinute, isCorrected }
    )),
    change: currentChange(facts)?.change ?? null,
    flowUsed: flowUsedOf(facts),
    indicatorAccuracy: accuracyOf(facts),
    segments: facts.segments.map(({ pumpId, fromAt, toAt, minutes, litresPerMinute, rule, litres }) => (
      { pumpId, fromAt, toAt, minutes, litresPerMinute, rule, litres }
    )),
    volumeLitres: facts.volumeLitres,
    volumeRange: facts.range,
    projection: facts.projection,
    checks: [...facts.checks],
    nextCheckDueAt: facts.nextCheckDueAt,
    coverageShare: facts.share && timeline.startedAt !== null ? facts.share.coverage.percent / 100 : null,
    findings,
    gaps,
    canHandInAsFit: isFitToHandIn(findings, gaps),
    workings: sheetWorkings(facts),
    ribbon: ribbonOf(facts, pauses),
  }
}

/** No gap, no finding that stops, and a reason for every one that asks for attention. */
function isFitToHandIn(findings: readonly Finding[], gaps: readonly Gap[]): boolean {
  const nonBlocking: readonly string[] = NON_BLOCKING_CODES
  return gaps.length === 0 && findings.every(({ severity, code, answer }) => (
    severity === 'note' || (severity === 'attention' && (answer !== null || nonBlocking.includes(code)))
  ))
}

/** The flow that the current segment is computed with; before the start, the one it would begin with. */
function flowUsedOf(facts: SheetFacts): SheetAssessment['flowUsed'] {
  if (facts.air !== 'pumped') return null
  const choice = facts.segments.at(-1)?.choice ?? flowChoiceOf(facts.currentSetting, facts.choice)
  const used = flowUsed(choice)
  if (!used) return null
  const why = flowRuleInWords(choice) ?? ''
  return {
    litresPerMinute: used.litresPerMinute, rule: used.rule,
    why: facts.segments.length > 1 ? `${why} This is the last of ${facts.segments.length} segments; each has its own flow.` : why,
  }
}

function accuracyOf(facts: SheetFacts): SheetAssessment['indicatorAccuracy'] {
  const pump = facts.pump(facts.pumpId)
  const flow = indicatedFlow(facts)
  if (!pump || flow === null) return null
  const at = accuracyPercentAt(pump.accuracy, flow)
  return at.outside ? null : { percent: at.percent, litresPerMinute: at.litresPerMinute }
}
