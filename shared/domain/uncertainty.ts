import { requireAbove, requireAtLeast, requireSome } from './check'

/**
 * Combined uncertainty of independent parts: the root of the sum of their squares.
 *
 * @param partsPercent standard uncertainties or errors of one kind, %, at least one, each 0 or more
 * @returns combined uncertainty, %
 * @throws RangeError when there is no part or one is negative or not finite
 * @source NIOSH 77-173, appendix D: Ec = (E1² + E2² + ...)^0.5
 * @example combinedPercent([15, 2, 10, 10]) // 20.712
 */
export function combinedPercent(partsPercent: readonly number[]): number {
  requireSome('combinedPercent', 'partsPercent', partsPercent)
  partsPercent.forEach((part, place) => requireAtLeast('combinedPercent', `partsPercent[${place}]`, part, 0))
  return Math.sqrt(partsPercent.reduce((sum, part) => sum + part * part, 0))
}

/**
 * Expanded uncertainty.
 *
 * @param combinedUncertaintyPercent combined standard uncertainty, %, 0 or more
 * @param coverageFactor factor k, above 0; 2 stands for about 95 %
 * @returns expanded uncertainty, %
 * @throws RangeError when a value is outside its range
 * @source EN 482:2021 and ISO 20581:2016: coverage factor 2
 * @example expandedPercent(10) // 20
 */
export function expandedPercent(combinedUncertaintyPercent: number, coverageFactor = 2): number {
  requireAtLeast('expandedPercent', 'combinedUncertaintyPercent', combinedUncertaintyPercent, 0)
  requireAbove('expandedPercent', 'coverageFactor', coverageFactor, 0)
  return combinedUncertaintyPercent * coverageFactor
}
