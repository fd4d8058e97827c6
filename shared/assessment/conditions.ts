import type { SheetEventOf } from '#shared/records/sheet-event'
import type { Placed } from './placed-events'

/** Temperature and station pressure, each null when nobody noted it. */
export interface AirConditions { temperatureCelsius: number | null, stationPressureKilopascals: number | null }
export interface KnownConditions { temperatureCelsius: number, stationPressureKilopascals: number }

/** Conditions where the sample was taken: the mean of what was noted on the sheet. */
export function samplingConditions(conditions: readonly Placed<'condition'>[]): AirConditions {
  return meanConditions(conditions.map(({ event }) => event.data))
}

/** Conditions where the flow was read: the mean of what was noted beside the readings. */
export function readingConditions(readings: readonly SheetEventOf<'flow-reading'>[]): AirConditions {
  return meanConditions(readings.map(({ data }) => data))
}

export function areKnown(conditions: AirConditions): conditions is KnownConditions {
  return conditions.temperatureCelsius !== null && conditions.stationPressureKilopascals !== null
}

function meanConditions(values: readonly AirConditions[]): AirConditions {
  return {
    temperatureCelsius: meanOf(values.map(value => value.temperatureCelsius)),
    stationPressureKilopascals: meanOf(values.map(value => value.stationPressureKilopascals)),
  }
}

function meanOf(values: readonly (number | null)[]): number | null {
  const known = values.filter(value => value !== null)
  return known.length === 0 ? null : known.reduce((sum, value) => sum + value, 0) / known.length
}
