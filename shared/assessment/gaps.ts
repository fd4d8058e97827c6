import type { Gap } from './sheet-assessment'
import { isSample } from './sample-kind'
import type { SheetFacts } from './sheet-facts'

/**
 * What is not there yet. A gap keeps a sheet from being handed in as fit, never from being handed in.
 *
 * Which gaps there are follows the kind of sheet: a blank needs its number and medium, a diffusive sampler no pump.
 */
export function findGaps(facts: SheetFacts): Gap[] {
  const { sheet, air, timeline } = facts
  const gaps: Gap[] = []
  const gap = (isMissing: boolean, code: string, part: Gap['part'], title: string) => {
    if (isMissing) gaps.push({ code, part, title })
  }
  gap(!sheet.number?.trim(), 'sample-number', 'set-up', 'The sample has no number.')
  gap(sheet.kind === 'personal' && sheet.workerId === null, 'worker', 'set-up', 'Nobody is chosen as the person who wears it.')
  gap(sheet.kind === 'area' && !sheet.areaName?.trim(), 'area', 'set-up', 'The place is not named.')
  gap(isSample(sheet.kind) && sheet.agentIds.length === 0, 'agents', 'set-up', 'No substance is chosen.')
  gap(sheet.methodId === null && sheet.kind !== 'bulk', 'method', 'set-up', 'No method is chosen.')
  if (air === 'pumped') {
    gap(facts.pumpId === null, 'pump', 'set-up', 'No pump is chosen.')
    for (const pumpId of facts.pumpsInUse) {
      gap(!facts.flows.get(pumpId)?.before && !facts.hasSetting(pumpId), 'flow-before', 'flow-before', `No flow before was read${facts.ofPump(pumpId)}.`)
    }
    gap(facts.pumpsInUse.length === 0, 'flow-before', 'flow-before', 'No flow before was read.')
  }
  if (air !== 'none') {
    gap(timeline.state === 'not-started', 'start', 'air', 'The sample was not started.')
    gap(timeline.state === 'running' || timeline.state === 'paused', 'stop', 'air', 'The sample is not stopped.')
  }
  else gap(timeline.state === 'running' || timeline.state === 'paused', 'stop', 'air', 'It is open still: cap it and stop.')
  if (air === 'pumped' && timeline.state === 'stopped') {
    for (const pumpId of facts.pumpsInUse) {
      gap(!facts.flows.get(pumpId)?.after, 'flow-after', 'flow-after', `No flow after was read${facts.ofPump(pumpId)}.`)
    }
  }
  return gaps
}
