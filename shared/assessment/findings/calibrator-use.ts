import type { Calibrator } from '#shared/records/calibrator'
import { dayAt } from '../place-time'
import type { SheetFacts } from '../sheet-facts'
import { readFlows, type ReadFlow } from './read-flows'

export interface CalibratorUse { set: ReadFlow, calibratorId: string, calibrator: Calibrator, dayOn: string }

/** Each calibrator of each set of readings, with the day it was used on. */
export function calibratorUses(facts: SheetFacts): CalibratorUse[] {
  return readFlows(facts).flatMap((set) => {
    const seen = new Map<string, CalibratorUse>()
    for (const { data, at } of set.summary.readings) {
      const calibrator = data.calibratorId === null ? undefined : facts.bundle.calibrators[data.calibratorId]
      if (!calibrator || data.calibratorId === null || seen.has(data.calibratorId)) continue
      seen.set(data.calibratorId, { set, calibratorId: data.calibratorId, calibrator, dayOn: dayAt(Date.parse(at), facts.zone) })
    }
    return [...seen.values()]
  })
}
