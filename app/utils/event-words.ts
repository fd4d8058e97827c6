import type { SheetEvent, SheetEventData, SheetEventType } from '#shared/records/sheet-event'
import { formatFlow, formatTime, inWords } from './format'
import type { NameOf } from './record-names'
import { EVENT_WORDS, PUMP_FAULT_WORDS, TIMER_WORDS } from './record-words'

export interface EventWords { title: string, detail: string }

/** The part of an event that is put into words; a change in the history carries no more. */
export type SaidEvent = { [T in SheetEventType]: { type: T, data: SheetEventData[T] } }[SheetEventType]

/** An event of a sheet as its timeline shows it: what happened in a word or two, then what was noted. */
export function eventInWords(event: SaidEvent, nameOf: NameOf, zone: string): EventWords {
  const title = EVENT_WORDS[event.type]
  switch (event.type) {
    case 'timer': {
      const pump = event.data.pumpId ? nameOf(event.data.pumpId) : 'no pump'
      return { title: TIMER_WORDS[event.data.action], detail: joined(pump, event.data.reason) }
    }
    case 'flow-reading': {
      const { when, typed, unit, pumpId, calibratorId, samplerInLine } = event.data
      return {
        title: `${title} ${when}`,
        detail: joined(
          `${typed} ${unit}`,
          nameOf(pumpId),
          calibratorId ? `read by ${nameOf(calibratorId)}` : 'no calibrator named',
          samplerInLine ? `${samplerInLine} in line` : 'no sampler in line',
        ),
      }
    }
    case 'flow-check': {
      const { typed, unit, by, calibratorId, pumpId, pumpMinutes, note } = event.data
      const reader = by === 'calibrator' && calibratorId ? `read by ${nameOf(calibratorId)}` : 'as the pump shows it'
      return {
        title,
        detail: joined(typed ? `${typed} ${unit}` : 'no flow read', reader, nameOf(pumpId), pumpMinutes === null ? null : `pump's own timer ${pumpMinutes} min`, note),
      }
    }
    case 'pump-fault': return { title: `${title}: ${PUMP_FAULT_WORDS[event.data.fault].toLowerCase()}`, detail: joined(nameOf(event.data.pumpId), event.data.note) }
    case 'pump-swap': return { title, detail: joined(`${nameOf(event.data.fromPumpId)} replaced by ${nameOf(event.data.pumpId)}`, event.data.reason) }
    case 'flow-reset': {
      const { fromLitresPerMinute, typed, unit, pumpId } = event.data
      const found = fromLitresPerMinute === null ? 'found at a flow not noted' : `found at ${inWords(formatFlow(fromLitresPerMinute))}`
      return { title, detail: joined(found, `set to ${typed} ${unit}`, nameOf(pumpId)) }
    }
    case 'activity': {
      const { text, fromAt, toAt } = event.data
      const span = toAt ? `${formatTime(fromAt, zone)} to ${formatTime(toAt, zone)}` : `from ${formatTime(fromAt, zone)}`
      return { title, detail: joined(text, span) }
    }
    case 'condition': {
      const { temperatureCelsius, stationPressureKilopascals, relativeHumidityPercent } = event.data
      return {
        title,
        detail: joined(
          temperatureCelsius === null ? null : `${temperatureCelsius} °C`,
          stationPressureKilopascals === null ? null : `${stationPressureKilopascals} kPa at the station`,
          relativeHumidityPercent === null ? null : `${relativeHumidityPercent} % relative humidity`,
        ),
      }
    }
    case 'note': return { title, detail: event.data.text }
    case 'finding-answer': return { title, detail: joined(event.data.code.replaceAll('-', ' '), event.data.reason) }
    case 'signature': return { title: 'Signed', detail: event.data.name }
    case 'clock-jump': {
      const seconds = Math.round((event.data.wallMilliseconds - event.data.monotonicMilliseconds) / 1000)
      return { title: 'Clock of the phone changed', detail: `by ${Math.abs(seconds)} s ${seconds < 0 ? 'back' : 'forward'}` }
    }
  }
}

/** Who said it, where that is not the signed-in person. */
export function saidBy(event: Pick<SheetEvent, 'by'>, nameOf: NameOf): string | null {
  if (!event.by) return null
  const name = event.by.name ?? (event.by.id ? nameOf(event.by.id) : null)
  const role = event.by.role === 'worker' ? 'the worker' : 'a colleague'
  return name ? `said by ${role}, ${name}` : `said by ${role}`
}

function joined(...parts: (string | null)[]): string {
  return parts.filter(Boolean).join(' · ')
}
