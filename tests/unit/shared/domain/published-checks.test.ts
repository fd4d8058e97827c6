import { readdirSync, readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { describe, expect, it } from 'vitest'
import { flowFromBuret, meanFlow } from '#shared/domain/calibration'
import { bubbleMeterFlow, isRotameterCorrectionApplicable, rotameterCorrectedFlow, standardAtmospherePascals } from '#shared/domain/correction'
import { flowChangePercent, flowChangeVerdict } from '#shared/domain/deviation'
import { sampledMinutes } from '#shared/domain/duration'
import { flowUsed } from '#shared/domain/flow-used'
import { accuracyPercentAt } from '#shared/domain/indicator-accuracy'
import { localInstant } from '#shared/domain/local-time'
import { blanksNeeded, COMMON_BLANKS_RULE, litresToLoad, litresToQuantify, maximumMinutesForLoad, maximumMinutesForVolume, minimumMinutesToQuantify } from '#shared/domain/planning'
import { antoineKilopascals, iapwsKilopascals, magnusKilopascals, saturationPressureKilopascals } from '#shared/domain/saturation-pressure'
import { cubicMetres, kilopascals, pressureIn } from '#shared/domain/units'
import { sampledVolume } from '#shared/domain/volume'

/** A published or recomputed worked example, with where it was read and how far it was checked. */
interface PublishedCase {
  id: string
  topic: string
  name: string
  inputs: Record<string, unknown>
  expected: Record<string, unknown>
  tolerance: number | { formulas: number, agreement_rel: number }
  source: string
  status: 'verified' | 'recomputed' | 'memory'
  note?: string
}

interface Computed {
  values: Record<string, unknown>
  /** where a printed value has its own precision, apart from the case's tolerance */
  tolerances?: Record<string, number>
}

const FOLDER = resolve(import.meta.dirname, '../../../fixtures/published-checks')
const files = readdirSync(FOLDER).filter(file => file.endsWith('.json'))
const cases = files.flatMap(file => readCases(file))

/** One mapping a topic: from the words of the published case to our functions and back. */
const mappings: Record<string, (inputs: Inputs) => Computed> = {
  flow: (inputs) => {
    if (inputs.has('minutes')) {
      const [before, after, minutes] = [inputs.number('pre'), inputs.number('post'), inputs.number('minutes')]
      const used = flowUsed({ before, after, useNominal: false, attentionPercent: 5 })
      return { values: { V_mean: sampledVolume(meanFlow([before, after]), minutes), V_low: sampledVolume(used?.litresPerMinute ?? NaN, minutes) } }
    }
    const before = meanFlow(inputs.numbers('pre'))
    const after = meanFlow(inputs.numbers('post'))
    const attentionPercent = inputs.has('tolerance_pct') ? inputs.number('tolerance_pct') : 5
    const drift = flowChangePercent(before, after)
    return {
      values: {
        pre_avg: before,
        post_avg: after,
        drift_pct: drift,
        mean: flowUsed({ before, after, useNominal: false, attentionPercent })?.litresPerMinute,
        within: flowChangeVerdict(drift, { attentionPercent, stopPercent: 10 }) === 'within',
      },
    }
  },

  time: (inputs) => {
    const pauses = inputs.has('pauses') ? inputs.raw('pauses') as [string, string][] : []
    return {
      values: {
        minutes: sampledMinutes({
          startedAt: readInstant(inputs.text('start')),
          stoppedAt: readInstant(inputs.text('stop')),
          pauses: pauses.map(([from, to]) => ({ fromAt: readInstant(from), toAt: readInstant(to) })),
        }),
      },
    }
  },

  volume: (inputs) => {
    const litres = sampledVolume(inputs.number('flow'), inputs.number('minutes'))
    return { values: { V_L: litres, V_m3: cubicMetres(litres) }, tolerances: { V_m3: 0.00005 } }
  },

  rotameter: (inputs) => {
    if (inputs.has('pump_has_rotameter')) {
      return { values: { apply: isRotameterCorrectionApplicable(inputs.raw('pump_has_rotameter') ? 'rotameter' : 'electronic') } }
    }
    return {
      values: {
        Q: rotameterCorrectedFlow({
          indicatedLitresPerMinute: inputs.number('Q_ind'),
          calibrationPressureKilopascals: kilopascals(inputs.number('Pc'), 'mmHg'),
          calibrationTemperatureCelsius: inputs.number('Tc_C'),
          samplingPressureKilopascals: kilopascals(inputs.number('Ps'), 'mmHg'),
          samplingTemperatureCelsius: inputs.number('Ts_C'),
        }),
      },
    }
  },

  bubble: (inputs) => {
    if (inputs.has('times_s')) return { values: { Q_L_min: flowFromBuret(inputs.number('vol_mL'), inputs.numbers('times_s')) } }
    return {
      values: {
        Pw_mmHg: pressureIn(saturationPressureKilopascals(inputs.number('T_C')), 'mmHg'),
        Q: bubbleMeterFlow({
          bubbleLitresPerMinute: inputs.number('Q_bubble'),
          pressureKilopascals: kilopascals(inputs.number('P_mmHg'), 'mmHg'),
          temperatureCelsius: inputs.number('T_C'),
          inletRelativeHumidityPercent: inputs.number('RH_in'),
        }),
      },
      // The printed pressure carries one decimal and came from another formula; the formulas agree within 0.5 %.
      tolerances: { Pw_mmHg: 23.7 * 0.005 },
    }
  },

  psat: (inputs) => {
    const celsius = inputs.number('T_C')
    const iapws = iapwsKilopascals(celsius)
    return {
      values: {
        magnus_kPa: magnusKilopascals(celsius),
        buck1996_kPa: saturationPressureKilopascals(celsius),
        antoine_kPa: antoineKilopascals(celsius),
        iapws_kPa: iapws,
        mmHg_iapws: pressureIn(iapws, 'mmHg'),
      },
      tolerances: { mmHg_iapws: 0.0051 },
    }
  },

  altitude: (inputs) => {
    const pascals = standardAtmospherePascals(inputs.number('H_m'))
    return { values: { P_Pa: pascals, P_mmHg: pressureIn(pascals / 1000, 'mmHg') }, tolerances: { P_mmHg: 0.051 } }
  },

  blanks: inputs => ({ values: { blanks: inputs.numbers('samples').map(samples => blanksNeeded(samples, COMMON_BLANKS_RULE)) } }),

  duration: (inputs) => {
    if (inputs.has('LOQ_ug')) {
      const input = {
        loqMicrograms: inputs.number('LOQ_ug'),
        limitMilligramsPerCubicMetre: inputs.number('OEL_ug_m3') / 1000,
        fraction: inputs.number('fraction'),
      }
      return { values: { V_L: litresToQuantify(input), t_min: minimumMinutesToQuantify({ ...input, flowLitresPerMinute: inputs.number('flow') }) } }
    }
    if (inputs.has('max_load_mg')) {
      const input = { maximumLoadMilligrams: inputs.number('max_load_mg'), concentrationMilligramsPerCubicMetre: inputs.number('C_mg_m3') }
      return { values: { V_L: litresToLoad(input), t_min: maximumMinutesForLoad({ ...input, flowLitresPerMinute: inputs.number('flow') }) } }
    }
    return { values: { t_min: maximumMinutesForVolume(inputs.number('Vmax_L'), inputs.number('flow')) } }
  },

  uncertainty: (inputs) => {
    const at = accuracyPercentAt({
      kind: 'percent-of-full-scale',
      percent: inputs.number('spec_pct_FS'),
      fullScaleLitresPerMinute: inputs.number('range_L_min'),
    }, inputs.number('reading'))
    return at.outside ? { values: {} } : { values: { abs: at.litresPerMinute, relative_pct: at.percent }, tolerances: { abs: 1e-12 } }
  },
}

describe('published checks', () => {
  it('are all here, each once', () => {
    expect(new Set(cases.map(one => one.id)).size).toBe(cases.length)
    expect(cases.length).toBeGreaterThanOrEqual(26)
    for (const topic of Object.keys(mappings)) expect(cases.some(one => one.topic === topic), `no case of topic ${topic}`).toBe(true)
  })

  it.each(cases)('$id $topic: $name', ({ id, topic, inputs, expected, tolerance, source, status }) => {
    expect(source, `${id} needs its source`).not.toBe('')
    expect(['verified', 'recomputed', 'memory']).toContain(status)
    const mapping = mappings[topic]
    if (!mapping) throw new Error(`${id}: nobody maps topic "${topic}" to shared/domain yet; add a mapping in this file`)
    const { values, tolerances = {} } = mapping(new Inputs(id, inputs))
    for (const [key, value] of Object.entries(expected)) {
      expectWithin(values[key], value, tolerances[key] ?? (typeof tolerance === 'number' ? tolerance : tolerance.formulas), `${id} ${key}`)
    }
  })

  it.each(cases.filter(one => one.topic === 'psat'))('$id: the formulas in use agree with the reference equation', ({ inputs, tolerance }) => {
    const celsius = Number(inputs.T_C)
    const reference = iapwsKilopascals(celsius)
    const allowed = typeof tolerance === 'number' ? tolerance : tolerance.agreement_rel
    for (const formula of [saturationPressureKilopascals, magnusKilopascals, antoineKilopascals]) {
      expect(Math.abs(formula(celsius) / reference - 1), formula.name).toBeLessThanOrEqual(allowed)
    }
  })

  it('keeps the warning about floating point beside the case it belongs to', () => {
    expect(cases.find(one => one.id === 'C061')?.note).toContain('Beware floating point')
    expect(Math.abs((1.9 - 2.0) / 2.0)).toBeGreaterThan(0.05)
  })
})

function readCases(file: string): PublishedCase[] {
  return JSON.parse(readFileSync(resolve(FOLDER, file), 'utf8')) as PublishedCase[]
}

/** A clock time without a day stands for any one day in UTC; a local time is followed by its zone. */
function readInstant(text: string): string {
  const [local = '', zone] = text.split(' ')
  if (!zone) return `2026-07-03T${local}:00Z`
  const instant = localInstant(local, zone)
  if (!instant.ok) throw new Error(`${text} is ${instant.reason}`)
  return instant.at
}

function expectWithin(actual: unknown, expected: unknown, tolerance: number, where: string): void {
  if (Array.isArray(expected)) {
    expect(actual, where).toHaveLength(expected.length)
    expected.forEach((value, place) => expectWithin((actual as unknown[])[place], value, tolerance, `${where}[${place}]`))
  }
  else if (typeof expected === 'number') {
    expect(actual, `${where} is not computed`).toBeTypeOf('number')
    expect(Math.abs(Number(actual) - expected), `${where}: ${actual} against ${expected}`).toBeLessThanOrEqual(tolerance)
  }
  else {
    expect(actual, where).toBe(expected)
  }
}

/** The inputs of a case, read strictly: a misspelt name fails instead of computing with undefined. */
class Inputs {
  constructor(private readonly id: string, private readonly values: Record<string, unknown>) {}

  has(name: string): boolean {
    return name in this.values
  }

  raw(name: string): unknown {
    if (!this.has(name)) throw new Error(`${this.id} has no input "${name}"`)
    return this.values[name]
  }

  number(name: string): number {
    const value = this.raw(name)
    if (typeof value !== 'number') throw new Error(`${this.id}: "${name}" is no number`)
    return value
  }

  numbers(name: string): number[] {
    const value = this.raw(name)
    if (!Array.isArray(value) || !value.every(one => typeof one === 'number')) throw new Error(`${this.id}: "${name}" is no list of numbers`)
    return value
  }

  text(name: string): string {
    const value = this.raw(name)
    if (typeof value !== 'string') throw new Error(`${this.id}: "${name}" is no text`)
    return value
  }
}
