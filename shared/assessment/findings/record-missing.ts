import type { SheetFacts } from '../sheet-facts'
import type { FindingRule } from './finding-rule'
import { HOUSE_RULE } from './words'

/** The sheet names records that are not here, so that what depends on them could not be looked at. */
export const recordMissing: FindingRule = {
  code: 'record-missing',
  find(facts) {
    const missing = missingRecords(facts)
    if (missing.length === 0) return null
    return {
      severity: 'note', part: 'set-up',
      title: `Not here: ${missing.join(', ')}. What depends on ${missing.length === 1 ? 'it' : 'them'} was not checked.`,
      whatNow: 'Connect once so that everything is downloaded. Nothing on the sheet is lost.',
      numbers: missing.map(name => ({ name, value: 'not here', unit: '' })),
      rule: 'A check without its record is said, never passed in silence.',
      source: HOUSE_RULE,
    }
  },
}

function missingRecords({ sheet, bundle, pumpsInUse, pump, events }: SheetFacts): string[] {
  const calibratorIds = events.of('flow-reading').flatMap(({ event }) => event.data.calibratorId ?? [])
  return [
    ...(sheet.methodId !== null && !bundle.method ? ['the method'] : []),
    ...(sheet.samplerId !== null && !bundle.sampler ? ['the sampler'] : []),
    ...(sheet.workerId !== null && !bundle.worker ? ['the worker'] : []),
    ...(bundle.agents.length < sheet.agentIds.length ? ['a substance'] : []),
    ...(pumpsInUse.some(id => pump(id) === null) ? ['a pump'] : []),
    ...(calibratorIds.some(id => !bundle.calibrators[id]) ? ['a calibrator'] : []),
  ]
}
