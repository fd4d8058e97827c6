import type { PumpFault, SheetEventData, SheetEventType, SaidBy } from '#shared/records/sheet-event'
import type { Sheet } from '#shared/records/sheet'
import type { SeedDraft } from './draft'
import { namedId } from './ids'

/** One technician's phone in the demo: what it wrote, in the order in which it was written. */
export class SeedPhone {
  readonly drafts: SeedDraft[] = []

  constructor(readonly organisationId: string, readonly personId: string, readonly dev: string, readonly label: string) {}

  /** Starts a sheet. `name` makes its id; times are instants. */
  sheet(name: string, surveyId: string, at: string, initial: Partial<Sheet>): SeedSheet {
    const id = namedId(this.organisationId, 'sheet', name)
    this.drafts.push({ kind: 'obj.new', object: id, sheet: id, at, body: { type: 'sheet', parent: surveyId, initial: { ...initial, technicianId: this.personId } } })
    return new SeedSheet(this, id, name)
  }
}

/** Writes one sheet's events as the field's own screens would. */
export class SeedSheet {
  private count = 0

  constructor(private readonly phone: SeedPhone, readonly id: string, private readonly name: string) {}

  set<K extends keyof Sheet>(at: string, key: K, value: Sheet[K]): this {
    this.phone.drafts.push({ kind: 'reg.set', object: this.id, sheet: this.id, at, body: { key, value, base: null, resolves: false } })
    return this
  }

  event<T extends SheetEventType>(at: string, type: T, data: SheetEventData[T], more: { by?: SaidBy, corrects?: string, reason?: string } = {}): string {
    const id = namedId(this.phone.organisationId, 'event', this.name, String(this.count++))
    this.phone.drafts.push({
      id, kind: 'ev.add', object: this.id, sheet: this.id, at, by: more.by ?? null,
      body: { type, data: data as Record<string, unknown>, corrects: more.corrects ?? null, reason: more.reason ?? null },
    })
    return id
  }

  /** Readings against a calibrator, a minute apart, as typed. */
  readings(at: string, when: 'before' | 'after', pumpId: string, calibratorId: string, samplerInLine: string | null, typed: string[], unit: 'L/min' | 'mL/min' = 'L/min'): this {
    typed.forEach((text, index) => {
      const value = Number(text.replace(',', '.'))
      this.event(addMinutes(at, index), 'flow-reading', {
        when, pumpId, calibratorId, samplerInLine, typed: text, unit,
        litresPerMinute: unit === 'mL/min' ? value / 1000 : value,
        temperatureCelsius: null, stationPressureKilopascals: null,
      })
    })
    return this
  }

  timer(at: string, action: 'start' | 'pause' | 'resume' | 'stop', pumpId: string | null, reason: string | null = null): string {
    return this.event(at, 'timer', { action, pumpId, reason })
  }

  check(at: string, pumpId: string, typed: string, pumpMinutes: number | null = null): this {
    this.event(at, 'flow-check', { pumpId, by: 'indicator', calibratorId: null, typed, unit: 'L/min', litresPerMinute: Number(typed), pumpMinutes, note: null })
    return this
  }

  activity(at: string, text: string, toAt: string | null, by?: SaidBy): this {
    this.event(at, 'activity', { text, fromAt: at, toAt }, by ? { by } : {})
    return this
  }

  note(at: string, text: string, by?: SaidBy): this {
    this.event(at, 'note', { text }, by ? { by } : {})
    return this
  }

  conditions(at: string, temperatureCelsius: number, stationPressureKilopascals: number, relativeHumidityPercent: number): this {
    this.event(at, 'condition', { temperatureCelsius, stationPressureKilopascals, relativeHumidityPercent, typed: {} })
    return this
  }

  fault(at: string, pumpId: string, fault: PumpFault, note: string): this {
    this.event(at, 'pump-fault', { pumpId, fault, note })
    return this
  }

  answer(at: string, code: string, subject: string, reason: string): this {
    this.event(at, 'finding-answer', { code, subject, reason })
    return this
  }

  step(at: string, transition: 'hand-in', expect: number, fit: boolean, reason: string | null, signature: string): this {
    this.event(at, 'signature', { name: signature })
    this.phone.drafts.push({ kind: 'st.req', object: this.id, sheet: this.id, at, body: { transition, expect, fit, reason } })
    return this
  }
}

export function addMinutes(at: string, minutes: number): string {
  return new Date(Date.parse(at) + minutes * 60_000).toISOString()
}
