import { airOf } from '#shared/assessment/sample-kind'
import type { Progress, SheetPart } from '#shared/assessment/sheet-assessment'
import type { Sheet } from '#shared/records/sheet'
import type { Tone } from './tone'

export const SHEET_PART_WORDS: Readonly<Record<SheetPart, string>> = {
  'set-up': 'Set-up',
  'flow-before': 'Flow before',
  'air': 'Air',
  'flow-after': 'Flow after',
  'close': 'Close',
}

/** How a sheet's progress is told by shape. */
export const PROGRESS_TONES: Readonly<Record<Progress, Tone>> = {
  planned: 'waiting',
  ready: 'quiet',
  running: 'good',
  paused: 'waiting',
  stopped: 'attention',
  checked: 'good',
}

/** The small forms of a run, each opened by a button of its part of the page. */
export const AIR_TOOLS = ['note', 'conditions', 'fault', 'swap', 'reset', 'medium', 'time'] as const
export type AirTool = (typeof AIR_TOOLS)[number]

type KindOfSheet = Pick<Sheet, 'kind' | 'air'>

/** Whether air is drawn on this kind of sample at all; the others have only set-up and close. */
export function drawsAir(sheet: KindOfSheet): boolean {
  return airOf(sheet) !== 'none'
}

/** Whether a pump draws the air, so that there are flows to read. */
export function isPumped(sheet: KindOfSheet): boolean {
  return airOf(sheet) === 'pumped'
}

/** The parts of a sheet's page that this kind of sample has, in the order of the day. */
export function partsOf(sheet: KindOfSheet): SheetPart[] {
  if (isPumped(sheet)) return ['set-up', 'flow-before', 'air', 'flow-after', 'close']
  return drawsAir(sheet) ? ['set-up', 'air', 'close'] : ['set-up', 'close']
}
