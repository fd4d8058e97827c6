import type { Air, Sheet, SheetKind } from '#shared/records/sheet'

/** Kinds that stand for air somebody breathed or a place had; the others are blanks and materials. */
export const SAMPLE_KINDS: readonly SheetKind[] = ['personal', 'area']
export const BLANK_KINDS: readonly SheetKind[] = ['field-blank', 'media-blank']

export function isSample(kind: SheetKind): boolean {
  return SAMPLE_KINDS.includes(kind)
}

export function isBlank(kind: SheetKind): boolean {
  return BLANK_KINDS.includes(kind)
}

/** How the sheet draws air. Blanks, bulk and wipes draw none, whatever the field says. */
export function airOf(sheet: Pick<Sheet, 'kind' | 'air'>): Air {
  return isSample(sheet.kind) ? sheet.air : 'none'
}
