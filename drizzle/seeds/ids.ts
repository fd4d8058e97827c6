import { createHash } from 'node:crypto'

/** The same UUID for the same words in the same organisation, so that a seed run twice makes nothing twice. */
export function namedId(organisationId: string, ...words: string[]): string {
  const hex = createHash('sha256').update([organisationId, ...words].join('\n')).digest('hex')
  const variant = ((Number.parseInt(hex[16]!, 16) & 0x3) | 0x8).toString(16)
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-${variant}${hex.slice(17, 20)}-${hex.slice(20, 32)}`
}
