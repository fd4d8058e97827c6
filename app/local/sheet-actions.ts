import type { Sheet, SheetField } from '#shared/records/sheet'
import type { SheetAssessment } from '#shared/assessment/sheet-assessment'
import type { SheetBundle } from '#shared/records/sheet-bundle'
import { stands, type FLOW_UNITS, type PUMP_FAULTS, type SaidBy, type SheetEvent, type SheetEventData, type SheetEventType, type TIMER_ACTIONS } from '#shared/records/sheet-event'
import { sameValue } from '#shared/sync/same-value'
import { commit, InvalidChange, type CommitOptions, type OperationDraft } from './commit'
import type { FieldStore } from './field-store'
import { instantOf } from './surroundings'

const MINUTE_MILLISECONDS = 60_000

type FlowUnit = (typeof FLOW_UNITS)[number]
type PumpFault = (typeof PUMP_FAULTS)[number]
export type TimerAction = (typeof TIMER_ACTIONS)[number]

export interface FlowReadingInput {
  when: 'before' | 'after'
  typed: string
  unit: FlowUnit
  litresPerMinute: number
  samplerInLine: string | null
  pumpId: string
  calibratorId: string | null
  temperatureCelsius?: number | null
  stationPressureKilopascals?: number | null
}
export interface FlowCheckInput {
  by: 'indicator' | 'calibrator'
  calibratorId: string | null
  typed: string
  unit: FlowUnit
  litresPerMinute: number | null
  pumpMinutes: number | null
  note: string | null
}

/** A sheet as it is on the screen now. */
export interface ShownSheet {
  bundle: SheetBundle
  assessment: SheetAssessment | null
  /** How long the plan line wants it to run; null when nothing is planned. */
  plannedMinutes: number | null
  /** Refused steps of this sheet that nobody has answered yet. */
  refusedSteps: readonly string[]
}

/** Where the text of a field is kept while it is typed; setting the field takes it away in the same transaction. */
export function fieldDraftKey(sheetId: string, field: string): string {
  return `${sheetId}/${field}`
}

/**
 * Everything a technician does to a sheet, as operations. Each function resolves when the change is saved on this phone and
 * rejects when it is not.
 *
 * @param shown the sheet as it is on the screen, or null while it is not there yet
 */
export function createSheetActions(store: () => FieldStore, sheetId: () => string, shown: () => ShownSheet | null) {
  const own = new Map<string, { opId: string, replaced: Set<string | null> }>()

  function here(): ShownSheet {
    const sheet = shown()
    if (!sheet) throw new InvalidChange('The sheet is not on this phone yet.')
    return sheet
  }

  /**
   * The operation whose value the person saw when this one was made. Right after a change of one's own the screen may still
   * show the value before it; that change is then what was seen, and not a second opinion.
   */
  function baseOf(key: string, bundle: SheetBundle): string | null {
    const onScreen = bundle.document.origins[key as SheetField]?.opId ?? null
    const mine = own.get(`${sheetId()}/${key}`)
    return mine?.replaced.has(onScreen) ? mine.opId : onScreen
  }

  async function setRegister(key: string, value: unknown, resolves: boolean) {
    const { bundle } = here()
    const base = baseOf(key, bundle)
    const id = `${sheetId()}/${key}`
    const opId = store().surroundings.newId()
    const replaced = new Set(own.get(id)?.replaced ?? []).add(bundle.document.origins[key as SheetField]?.opId ?? null).add(base)
    // Noted before the write, so that a second change in the same moment knows of this one.
    const before = own.get(id)
    own.set(id, { opId, replaced })
    try {
      await write([{ id: opId, kind: 'reg.set', object: sheetId(), sheet: sheetId(), body: { key, value: value ?? null, base, resolves } }], { clearsDrafts: [fieldDraftKey(sheetId(), key)] })
    }
    catch (error) {
      if (before) own.set(id, before)
      else own.delete(id)
      throw error
    }
  }

  async function write(drafts: OperationDraft[], options?: CommitOptions): Promise<string[]> {
    return (await commit(store(), drafts, options)).map(operation => operation.id)
  }

  function event<T extends SheetEventType>(type: T, data: SheetEventData[T], extra: { at?: string, by?: SaidBy | null, corrects?: string, reason?: string, object?: string } = {}): OperationDraft {
    const object = extra.object ?? sheetId()
    return {
      kind: 'ev.add', object, sheet: object, at: extra.at, by: extra.by,
      body: { type, data: data as Record<string, unknown>, corrects: extra.corrects ?? null, reason: extra.reason ?? null },
    }
  }

  async function add<T extends SheetEventType>(type: T, data: SheetEventData[T], extra?: Parameters<typeof event>[2]): Promise<string> {
    return (await write([event(type, data, extra)]))[0]!
  }

  function currentPump({ bundle, assessment }: ShownSheet): string | null {
    return assessment?.currentPumpId ?? bundle.document.sheet.pumpId
  }

  /** The planned end becomes an instant when the run starts; one that a person set stays. */
  function plannedEndFrom({ bundle, plannedMinutes }: ShownSheet, at: string): OperationDraft[] {
    const { sheet, origins } = bundle.document
    if (plannedMinutes === null || sheet.plannedEndAt !== null || origins.plannedEndAt) return []
    const value = instantOf(Date.parse(at) + plannedMinutes * MINUTE_MILLISECONDS)
    return [{ kind: 'reg.set', object: sheetId(), sheet: sheetId(), body: { key: 'plannedEndAt', value, base: null, resolves: false } }]
  }

  function pumpHere(): string {
    const pump = currentPump(here())
    if (pump === null) throw new InvalidChange('Choose the pump first.')
    return pump
  }

  function standing(eventId: string): SheetEvent {
    const found = here().bundle.document.events.find(item => item.id === eventId)
    if (!found) throw new InvalidChange('This entry is not on the sheet.')
    if (!stands(found)) throw new InvalidChange('This entry was taken back already.')
    return found
  }

  return {
    async setField<K extends SheetField>(key: K, value: Sheet[K]): Promise<void> {
      const { bundle } = here()
      const isOwnPending = own.has(`${sheetId()}/${key}`) && baseOf(key, bundle) !== (bundle.document.origins[key]?.opId ?? null)
      if (!isOwnPending && sameValue(bundle.document.sheet[key], value) && !bundle.document.conflicts.some(conflict => conflict.isOpen && conflict.field === key)) return
      await setRegister(key, value, false)
    },
    chooseValue: (field: string, value: unknown): Promise<void> => setRegister(field, value, true),

    addFlowReading: ({ temperatureCelsius = null, stationPressureKilopascals = null, ...reading }: FlowReadingInput): Promise<string> =>
      add('flow-reading', { ...reading, temperatureCelsius, stationPressureKilopascals }),

    async timer(action: TimerAction, options: { at?: string, reason?: string | null } = {}): Promise<string> {
      const sheet = here()
      const at = options.at ?? instantOf(store().surroundings.now())
      return (await write([
        event('timer', { action, pumpId: pumpOfRun(sheet), reason: options.reason ?? null }, { at }),
        ...action === 'start' ? plannedEndFrom(sheet, at) : [],
      ]))[0]!
    },

    async addFlowCheck(input: FlowCheckInput): Promise<string> {
      return add('flow-check', { ...input, pumpId: pumpHere() })
    },
    async reportFault(input: { fault: PumpFault, note: string | null }): Promise<string> {
      return add('pump-fault', { ...input, pumpId: pumpHere() })
    },
    async swapPump(input: { pumpId: string, reason: string | null }): Promise<string> {
      const fromPumpId = pumpHere()
      if (fromPumpId === input.pumpId) throw new InvalidChange('This pump is the one that runs now.')
      return add('pump-swap', { ...input, fromPumpId })
    },
    async resetFlow(input: { fromLitresPerMinute: number | null, toLitresPerMinute: number, typed: string, unit: FlowUnit }): Promise<string> {
      return add('flow-reset', { ...input, pumpId: pumpHere() })
    },

    async changeMedium(input: { number: string | null, medium: string | null, mediumLot: string | null, at?: string }): Promise<string> {
      const sheet = here()
      const newSheetId = store().surroundings.newId()
      const at = input.at ?? instantOf(store().surroundings.now())
      const pumpId = pumpOfRun(sheet)
      const progress = sheet.assessment?.progress
      const wasRunning = progress === 'running'
      const drafts: OperationDraft[] = []
      if (wasRunning || progress === 'paused') drafts.push(event('timer', { action: 'stop', pumpId, reason: 'Medium changed' }, { at }))
      drafts.push({
        kind: 'obj.new', object: newSheetId, sheet: newSheetId,
        body: { type: 'sheet', parent: sheet.bundle.document.surveyId, initial: continuedSheet(sheet.bundle, { ...input, pumpId, technicianId: store().person.id }) },
      })
      for (const carried of carriedReadings(sheet, pumpId)) {
        drafts.push(event(carried.type, carried.data, { at: carried.at, object: newSheetId, reason: `carried over from ${sheet.bundle.document.sheet.number ?? 'the sheet before'}` }))
      }
      if (wasRunning) drafts.push(event('timer', { action: 'start', pumpId, reason: null }, { at, object: newSheetId }))
      await write(drafts)
      return newSheetId
    },

    addActivity: ({ by, ...activity }: { text: string, fromAt: string, toAt: string | null, by: SaidBy | null }): Promise<string> =>
      add('activity', activity, { by }),
    addNote: (text: string, by: SaidBy | null = null): Promise<string> => add('note', { text }, { by }),
    addCondition: (input: SheetEventData['condition']): Promise<string> => add('condition', input),
    answerFinding: (code: string, subject: string, reason: string): Promise<string> => add('finding-answer', { code, subject, reason }),

    async correct(eventId: string, change: { at?: string, data?: Record<string, unknown> }, reason: string): Promise<string> {
      const old = standing(eventId)
      if (!reason.trim()) throw new InvalidChange('Say why it is corrected.')
      const data = { ...old.data, ...change.data } as SheetEventData[SheetEventType]
      const written = await write([
        { kind: 'ev.void', object: sheetId(), sheet: sheetId(), body: { target: eventId, reason } },
        event(old.type, data, { at: change.at ?? old.at, by: old.by, corrects: eventId, reason }),
      ])
      return written[1]!
    },
    async takeBack(eventId: string, reason: string): Promise<void> {
      standing(eventId)
      if (!reason.trim()) throw new InvalidChange('Say why it is taken back.')
      await write([{ kind: 'ev.void', object: sheetId(), sheet: sheetId(), body: { target: eventId, reason } }])
    },

    async handIn(input: { fit: boolean, reason: string | null, name: string }): Promise<void> {
      const { bundle, assessment, refusedSteps } = here()
      if (!input.fit && !input.reason?.trim()) throw new InvalidChange('Say why the sample is not fit to use.')
      if (input.fit && assessment && !assessment.canHandInAsFit) throw new InvalidChange('A stop finding or a gap stands, so this sample cannot be handed in as fit. Hand it in as not fit, with the reason.')
      if (!input.name.trim()) throw new InvalidChange('Give your name in place of a signature.')
      await write([
        event('signature', { name: input.name.trim() }),
        {
          kind: 'st.req', object: sheetId(), sheet: sheetId(),
          body: { transition: 'hand-in', expect: bundle.document.standing.revision, fit: input.fit, reason: input.reason?.trim() || null },
        },
      ], { answers: refusedSteps })
    },
  }

  /** The pump a timer event names: none for a sampler that draws no air through a pump. */
  function pumpOfRun(sheet: ShownSheet): string | null {
    return sheet.bundle.document.sheet.air === 'pumped' ? currentPump(sheet) : null
  }
}

export type SheetActions = ReturnType<typeof createSheetActions>

/** The first values of a sheet that goes on with a new medium: who, what and how as before; the medium and its checks anew. */
function continuedSheet({ document }: SheetBundle, input: { number: string | null, medium: string | null, mediumLot: string | null, pumpId: string | null, technicianId: string }): Sheet {
  const isSameLot = input.mediumLot !== null && input.mediumLot === document.sheet.mediumLot
  return {
    ...document.sheet,
    number: input.number, medium: input.medium, mediumLot: input.mediumLot,
    mediumExpiresOn: isSameLot ? document.sheet.mediumExpiresOn : null,
    pumpId: input.pumpId ?? document.sheet.pumpId,
    technicianId: input.technicianId,
    continuesId: document.id, replacesId: null, seal: null,
    checkEndsBroken: null, checkPlugOut: null, checkArrow: null, checkCycloneUpright: null, checkLeak: null,
    archived: false,
  }
}

/**
 * What is known of the pump's setting when the medium is changed in mid-run: its flow readings before, and a later reset. They
 * stand on the new sheet as what they are, at the instant they were taken, and say which sheet they come from.
 */
function carriedReadings({ bundle }: ShownSheet, pumpId: string | null): SheetEvent[] {
  if (pumpId === null) return []
  const events = bundle.document.events.filter(stands)
  const before = events.filter(item => item.type === 'flow-reading' && item.data.when === 'before' && item.data.pumpId === pumpId)
  const reset = events.findLast(item => item.type === 'flow-reset' && item.data.pumpId === pumpId)
  return reset ? [...before, reset] : before
}
