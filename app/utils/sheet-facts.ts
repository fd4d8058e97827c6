import { localParts } from '#shared/domain/local-time'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import type { Sheet } from '#shared/records/sheet'
import { formatDay, formatInstant, formatTime } from './format'
import type { NameOf } from './record-names'
import { AIR_WORDS, CHECK_WORDS, FIELD_WORDS, INLET_SIDE_WORDS, SHEET_KIND_WORDS, USUAL_DAY_WORDS } from './record-words'

/** A fact as `UiFacts` shows it; null is "not noted". */
export interface Fact { label: string, value: string | null }
export interface FactGroup { title: string, facts: Fact[] }

const CHECKS = ['checkEndsBroken', 'checkPlugOut', 'checkArrow', 'checkCycloneUpright', 'checkLeak'] as const

/** What the sheet says of who, what, train and surroundings, in the order in which a reviewer reads it. */
export function sheetFacts(bundle: SheetBundle, nameOf: NameOf, zone: string): FactGroup[] {
  const { sheet } = bundle.document
  const pumped = sheet.air === 'pumped'
  return [
    { title: 'Who and when', facts: whoFacts(bundle, nameOf, zone) },
    {
      title: 'What',
      facts: [
        fact('Agents', bundle.agents.length > 0 ? bundle.agents.map(agent => (agent.cas ? `${agent.name} (CAS ${agent.cas})` : agent.name)).join(', ') : null),
        fact('Method', bundle.method ? `${bundle.method.code}, ${bundle.method.title}` : null),
        fact('Medium', sheet.medium ?? bundle.method?.medium ?? null),
        fact('Lot', sheet.mediumLot),
        fact('Medium expires', sheet.mediumExpiresOn ? formatDay(sheet.mediumExpiresOn) : null),
        fact('Seal', sheet.seal),
      ],
    },
    {
      title: 'Train',
      facts: [
        fact('How air is drawn', AIR_WORDS[sheet.air]),
        fact('Sampler', bundle.sampler ? samplerWords(bundle.sampler.name, bundle.sampler.designFlowLitresPerMinute) : null),
        ...(pumped ? pumpFacts(bundle) : []),
        fact('Inlet', [sheet.inletSide ? INLET_SIDE_WORDS[sheet.inletSide] : '', sheet.inletPosition ?? ''].filter(Boolean).join(', ') || null),
        ...CHECKS.filter(check => sheet[check] !== null).map(check => fact(FIELD_WORDS[check], CHECK_WORDS[sheet[check]!])),
        fact(FIELD_WORDS.protection, sheet.protection),
        fact(FIELD_WORDS.controls, sheet.controls),
      ],
    },
  ]
}

function whoFacts({ document, worker, survey }: SheetBundle, nameOf: NameOf, zone: string): Fact[] {
  const { sheet } = document
  const isPersonal = sheet.kind === 'personal'
  return [
    fact('Survey', survey?.title ?? null),
    fact('Kind of sample', SHEET_KIND_WORDS[sheet.kind]),
    ...(isPersonal ? [fact('Worker', worker?.code ?? null), fact('Job', sheet.jobTitle ?? (worker?.jobTitle || null))] : [fact('Place', sheet.areaName)]),
    fact('Task', sheet.task),
    ...(sheet.groupId ? [fact(FIELD_WORDS.groupId, nameOf(sheet.groupId))] : []),
    fact('Shift', shiftWords(sheet, zone)),
    ...(isPersonal ? [fact('Usual day', [sheet.usualDay ? USUAL_DAY_WORDS[sheet.usualDay] : '', sheet.usualDayNote ?? ''].filter(Boolean).join(': ') || null)] : []),
    fact('Technician', sheet.technicianId ? nameOf(sheet.technicianId) : nameOf(document.createdBy)),
    ...(sheet.replacesId ? [fact(FIELD_WORDS.replacesId, nameOf(sheet.replacesId))] : []),
    ...(sheet.continuesId ? [fact(FIELD_WORDS.continuesId, nameOf(sheet.continuesId))] : []),
  ]
}

function pumpFacts({ document: { sheet }, pumps, calibrators }: SheetBundle): Fact[] {
  const pump = sheet.pumpId ? pumps[sheet.pumpId] : undefined
  const calibrator = sheet.calibratorId ? calibrators[sheet.calibratorId] : undefined
  const due = calibrator?.dueOn ? `, certificate due ${formatDay(calibrator.dueOn)}` : ', no certificate date'
  return [
    fact('Pump', pump ? `${pump.make} ${pump.serial}` : null),
    fact('Flow calibrator', calibrator ? `${calibrator.make} ${calibrator.serial}${due}` : null),
    fact('Planned flow', sheet.plannedFlowLitresPerMinute === null ? null : `${sheet.plannedFlowLitresPerMinute} L/min`),
    ...(sheet.sharesPump ? [fact(FIELD_WORDS.sharesPump, 'yes, through a splitter')] : []),
  ]
}

function samplerWords(name: string, designFlow: number | null): string {
  return designFlow === null ? name : `${name}, made for ${designFlow} L/min`
}

function shiftWords(sheet: Sheet, zone: string): string | null {
  const { shiftStartsAt, shiftEndsAt } = sheet
  if (!shiftStartsAt || !shiftEndsAt) return null
  const isOneDay = localParts(shiftStartsAt, zone).dayOn === localParts(shiftEndsAt, zone).dayOn
  return `${formatInstant(shiftStartsAt, zone)} to ${isOneDay ? formatTime(shiftEndsAt, zone) : formatInstant(shiftEndsAt, zone)}`
}

function fact(label: string, value: string | null): Fact {
  return { label, value: value === '' ? null : value }
}
