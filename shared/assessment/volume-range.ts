import type { Method } from '#shared/records/method'
import type { Agent } from '#shared/records/agent'
import type { SheetAssessment } from './sheet-assessment'

export type VolumeRange = SheetAssessment['volumeRange']

/**
 * The volumes between which a sample must lie: the method's, or what it says of the agents on the sheet where that is
 * narrower. An empty cell is "no range stored": it is said, never passed in silence.
 *
 * @param method the sheet's method, null when none is chosen
 * @param agents the agents on the sheet
 * @returns litres, each bound null when nothing is stored; where the bounds come from, and how far that can be trusted
 */
export function volumeRange(method: Method | null, agents: readonly Agent[]): VolumeRange {
  if (!method) return { minimumLitres: null, maximumLitres: null, from: 'No method chosen', status: '' }
  const names = new Set(agents.map(agent => nameKey(agent.name)))
  const rows = method.agentVolumes.filter(row => names.has(nameKey(row.agent)))
  const range: VolumeRange = {
    minimumLitres: method.volumeMinimumLitres, maximumLitres: method.volumeMaximumLitres, from: method.code, status: method.status,
  }
  for (const row of rows) {
    const isHigher = row.volumeMinimumLitres !== null && row.volumeMinimumLitres > (range.minimumLitres ?? 0)
    const isLower = row.volumeMaximumLitres !== null && row.volumeMaximumLitres < (range.maximumLitres ?? Infinity)
    if (isHigher) range.minimumLitres = row.volumeMinimumLitres
    if (isLower) range.maximumLitres = row.volumeMaximumLitres
    if (isHigher || isLower) {
      range.from = `${range.from}, ${row.agent}`
      if (row.status === 'memory') range.status = 'memory'
    }
  }
  if (range.minimumLitres === null && range.maximumLitres === null) range.from = `No volume range stored for ${method.code}`
  return range
}

function nameKey(name: string): string {
  return name.trim().toLowerCase()
}
