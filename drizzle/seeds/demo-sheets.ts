import type { Sheet } from '#shared/records/sheet'
import type { Transition } from '#shared/records/sheet-state'
import { daysFrom, demoIds, type DemoIds } from './demo-organisation'
import { addMinutes, SeedPhone, type SeedSheet } from './seed-phone'

/** A step that the office takes after the phones have sent. */
export interface SeedDecision { sheetId: string, transition: Transition, at: string, fit: boolean | null, reason: string | null }

export interface DemoSheets { phones: SeedPhone[], decisions: SeedDecision[] }

const HD_CYCLONE = 'Higgins-Dewell type respirable cyclone'
const CASSETTE = '37-mm closed-face cassette'

/**
 * About twenty sheets of the invented scenario, in every state, some with findings: one survey that runs today relative to
 * `now`, one of last week in review. Each was written as the phones write it.
 */
export function demoSheets(organisationId: string, now: Date): DemoSheets {
  const ids = demoIds(organisationId)
  const phone = (email: string, dev: string, label: string) => new SeedPhone(organisationId, ids.person(email), dev, label)
  const orla = phone('orla@tallowbridge.example', 'd_demo-orla', 'Orla\'s phone')
  const tomas = phone('tomas@tallowbridge.example', 'd_demo-tomas', 'Tomas\'s phone')
  const ines = phone('ines@tallowbridge.example', 'd_demo-ines', 'Ines\'s phone')
  const scene: Scene = { ids, organisationId, orla, tomas, ines, decisions: [] }
  today(scene, floorToMinutes(now, 5))
  lastWeek(scene, now)
  return { phones: [orla, tomas, ines], decisions: scene.decisions }
}

interface Scene { ids: DemoIds, organisationId: string, orla: SeedPhone, tomas: SeedPhone, ines: SeedPhone, decisions: SeedDecision[] }

interface Train { pump: string, calibrator?: string, before: string[], after?: string[], unit?: 'L/min' | 'mL/min' }

/** A personal sample with its set-up filled in. */
function silicaSheet(scene: Scene, by: SeedPhone, survey: string, number: string, worker: string, task: string, shiftStart: string, more: Partial<Sheet> = {}): SeedSheet {
  const { ids } = scene
  return by.sheet(number, survey, addMinutes(shiftStart, -45), {
    number, kind: 'personal', air: 'pumped', workerId: ids.worker(worker), task,
    agentIds: [ids.agent('Silica, crystalline, respirable (quartz, cristobalite, tridymite)')],
    methodId: ids.method('NMAM 7500'), samplerId: ids.sampler(HD_CYCLONE), medium: '5-um PVC, 37 mm', mediumLot: 'PV-2231', mediumExpiresOn: '2028-06-30',
    inletSide: 'left', checkPlugOut: 'done', checkArrow: 'not-applicable', checkEndsBroken: 'not-applicable', checkCycloneUpright: 'done', checkLeak: 'done',
    protection: 'Half mask with P3 filters, ear defenders', controls: 'Downdraught bench, extraction running',
    shiftStartsAt: shiftStart, shiftEndsAt: addMinutes(shiftStart, 480), plannedEndAt: addMinutes(shiftStart, 450), plannedFlowLitresPerMinute: 2.2, usualDay: 'usual',
    ...more,
  })
}

function hang(scene: Scene, sheet: SeedSheet, start: string, train: Train, sampler = HD_CYCLONE): SeedSheet {
  const pump = scene.ids.pump(train.pump)
  const calibrator = scene.ids.calibrator(train.calibrator ?? 'PD-19')
  sheet.set(addMinutes(start, -30), 'pumpId', pump).set(addMinutes(start, -30), 'calibratorId', calibrator)
  sheet.readings(addMinutes(start, -25), 'before', pump, calibrator, sampler, train.before, train.unit)
  return sheet
}

/** A whole shift: start, first check, lunch, second check, stop, flow after. */
function wholeShift(scene: Scene, sheet: SeedSheet, start: string, train: Train, options: { minutes?: number, lunch?: boolean, sampler?: string, checks?: [string, string] } = {}): string {
  const { minutes = 450, lunch = true, sampler = HD_CYCLONE } = options
  const pump = scene.ids.pump(train.pump)
  const hasTimer = !train.pump.startsWith('TE')
  const check = options.checks ?? [train.before[0]!, train.before[1]!]
  hang(scene, sheet, start, train, sampler)
  sheet.timer(start, 'start', pump)
  sheet.check(addMinutes(start, 16), pump, check[0], hasTimer ? 16 : null)
  sheet.activity(addMinutes(start, 20), 'Set up at the bench', addMinutes(start, 45))
  if (lunch) {
    sheet.timer(addMinutes(start, 240), 'pause', pump, 'lunch')
    sheet.timer(addMinutes(start, 274), 'resume', pump)
  }
  sheet.check(addMinutes(start, 300), pump, check[1], hasTimer ? (lunch ? 266 : 300) : null)
  const stop = addMinutes(start, minutes)
  sheet.timer(stop, 'stop', pump)
  if (train.after) sheet.readings(addMinutes(stop, 20), 'after', pump, scene.ids.calibrator(train.calibrator ?? 'PD-19'), sampler, train.after, train.unit)
  return stop
}

function today(scene: Scene, now: string): void {
  const { ids, orla, tomas, ines } = scene
  const survey = ids.surveyToday
  const shift = addMinutes(now, -200)

  const running = hang(scene, silicaSheet(scene, orla, survey, 'TB-2601', 'D-101', 'Fettling of pump housings', shift, { planLineId: ids.planLine(0) }), addMinutes(shift, 12), { pump: 'BR-0411', before: ['2.21', '2.20', '2.19'] })
  running.timer(addMinutes(shift, 12), 'start', ids.pump('BR-0411'))
  running.check(addMinutes(shift, 28), ids.pump('BR-0411'), '2.20', 16).activity(addMinutes(shift, 30), 'Cutting risers with the disc', addMinutes(shift, 95))
  running.conditions(addMinutes(shift, 35), 19, 100.8, 52)

  const paused = hang(scene, silicaSheet(scene, orla, survey, 'TB-2602', 'D-107', 'Pedestal grinding', shift, { planLineId: ids.planLine(2) }), addMinutes(shift, 18), { pump: 'BR-0412', before: ['2.18', '2.20', '2.22'] })
  paused.timer(addMinutes(shift, 18), 'start', ids.pump('BR-0412'))
  paused.check(addMinutes(shift, 34), ids.pump('BR-0412'), '2.19', 16)
  paused.timer(addMinutes(now, -14), 'pause', ids.pump('BR-0412'), 'lunch')

  const stopped = hang(scene, silicaSheet(scene, tomas, survey, 'TB-2611', 'D-102', 'Knock-out, short job', shift, { planLineId: ids.planLine(1), plannedEndAt: addMinutes(now, -20) }), addMinutes(shift, 5), { pump: 'BR-0418', before: ['2.23', '2.21', '2.22'] })
  stopped.timer(addMinutes(shift, 5), 'start', ids.pump('BR-0418'))
  stopped.activity(addMinutes(shift, 6), 'Knock-out grid', addMinutes(shift, 150))
  stopped.timer(addMinutes(now, -22), 'stop', ids.pump('BR-0418'))

  hang(scene, silicaSheet(scene, tomas, survey, 'TB-2612', 'D-126', 'Moulding with resin sand', addMinutes(now, -10)), addMinutes(now, 20), { pump: 'TE-207', before: ['2.2', '2.25', '2.2'] })

  ines.sheet('TB-2621', survey, addMinutes(shift, -20), {
    number: 'TB-2621', planLineId: ids.planLine(4), kind: 'area', air: 'pumped', areaName: 'Knock-out grid, north side', methodId: ids.method('NMAM 7500'), samplerId: ids.sampler(HD_CYCLONE),
    agentIds: [ids.agent('Silica, crystalline, respirable (quartz, cristobalite, tridymite)')],
  })
  ines.sheet('TB-2629', survey, addMinutes(shift, 30), {
    number: 'TB-2629', kind: 'field-blank', air: 'none', methodId: ids.method('NMAM 7500'), samplerId: ids.sampler(HD_CYCLONE), mediumLot: 'PV-2231', medium: '5-um PVC, 37 mm',
    agentIds: [ids.agent('Silica, crystalline, respirable (quartz, cristobalite, tridymite)')],
  })
}

function lastWeek(scene: Scene, now: Date): void {
  const { ids, orla, tomas, ines } = scene
  const survey = ids.surveyReview
  const morning = (daysAgo: number, time = '06:00') => `${daysFrom(now, -daysAgo).toISOString().slice(0, 10)}T${time}:00.000Z`
  const metals: Partial<Sheet> = {
    agentIds: [ids.agent('Lead, inorganic (as Pb)')], methodId: ids.method('NMAM 7082'), samplerId: ids.sampler(CASSETTE), medium: '0.8-um cellulose ester, 37 mm', mediumLot: 'CE-1187',
    plannedFlowLitresPerMinute: 2, checkCycloneUpright: 'not-applicable', controls: 'Canopy hood over the pouring line',
  }
  const solvent: Partial<Sheet> = {
    agentIds: [ids.agent('Toluene')], methodId: ids.method('NMAM 1501'), samplerId: null, medium: 'Charcoal tube 100/50', mediumLot: 'CT-0904', checkEndsBroken: 'done', checkArrow: 'done',
    checkPlugOut: 'not-applicable', checkCycloneUpright: 'not-applicable', plannedFlowLitresPerMinute: 0.05, protection: 'Air-fed hood while spraying', controls: 'Spray booth',
  }
  const decide = (sheet: SeedSheet, transition: Transition, at: string, reason: string | null = null, fit: boolean | null = null) => scene.decisions.push({ sheetId: sheet.id, transition, at, reason, fit })
  const office = (daysAgo: number, time: string) => morning(daysAgo, time)

  // Handed in and good.
  const good = silicaSheet(scene, orla, survey, 'TB-2541', 'D-119', 'Charging and tapping', morning(6), metals)
  let stop = wholeShift(scene, good, morning(6, '06:10'), { pump: 'BR-0411', before: ['2.01', '2.00', '1.99'], after: ['1.95', '1.94', '1.93'] }, { sampler: CASSETTE, minutes: 465 })
  good.activity(morning(6, '07:00'), 'Tapping, three pours', morning(6, '09:40')).activity(morning(6, '11:00'), 'Slag handling', morning(6, '12:15')).conditions(morning(6, '08:00'), 24, 100.6, 41)
  good.step(addMinutes(stop, 40), 'hand-in', 0, true, null, 'Orla Fenwick')

  // Change of flow beyond the second threshold: not fit.
  const drifted = silicaSheet(scene, orla, survey, 'TB-2542', 'D-120', 'Ladle preparation', morning(6), metals)
  stop = wholeShift(scene, drifted, morning(6, '06:16'), { pump: 'BR-0412', before: ['2.02', '2.00', '2.01'], after: ['1.75', '1.76', '1.74'] }, { sampler: CASSETTE, checks: ['1.99', '1.86'] })
  drifted.activity(morning(6, '07:10'), 'Lining a ladle', morning(6, '10:30')).note(morning(6, '13:20'), 'Tubing was kinked under the harness when taken off.')
  drifted.step(addMinutes(stop, 45), 'hand-in', 0, false, 'Flow fell by more than 10 %, tubing kinked.', 'Orla Fenwick')

  // Overdue calibrator and a change between the thresholds, answered.
  const overdue = silicaSheet(scene, tomas, survey, 'TB-2551', 'D-119', 'Charging and tapping', morning(5), metals)
  stop = wholeShift(scene, overdue, morning(5, '06:05'), { pump: 'BR-0418', calibrator: 'PB-04', before: ['2.00', '2.01', '2.00'], after: ['1.87', '1.88', '1.87'] }, { sampler: CASSETTE, minutes: 460 })
  overdue.activity(morning(5, '06:40'), 'Charging scrap', morning(5, '08:00'))
  overdue.answer(addMinutes(stop, 30), 'flow-change', ids.pump('BR-0418'), 'Filter visibly loaded; the lower flow is used.')
  for (const when of ['before', 'after']) overdue.answer(addMinutes(stop, 31), 'calibrator-overdue', `${ids.calibrator('PB-04')}/${ids.pump('BR-0418')}/${when}`, 'The dry-piston calibrator was with the other crew.')
  overdue.step(addMinutes(stop, 50), 'hand-in', 0, true, null, 'Tomas Reedmace')

  // Only two readings, one of them without the sampler, a pause with no reason.
  const careless = silicaSheet(scene, tomas, survey, 'TB-2552', 'D-120', 'Ladle preparation', morning(5), metals)
  hang(scene, careless, morning(5, '06:20'), { pump: 'TE-207', before: ['2.1', '2.05'] }, CASSETTE)
  careless.timer(morning(5, '06:20'), 'start', ids.pump('TE-207'))
  careless.timer(morning(5, '10:30'), 'pause', ids.pump('TE-207'))
  careless.timer(morning(5, '11:45'), 'resume', ids.pump('TE-207'))
  careless.timer(morning(5, '13:50'), 'stop', ids.pump('TE-207'))
  careless.readings(morning(5, '14:05'), 'after', ids.pump('TE-207'), ids.calibrator('PD-19'), null, ['2.0', '2.05'])
  careless.step(morning(5, '14:30'), 'hand-in', 0, false, 'Flow after was read without the cassette; only two readings.', 'Tomas Reedmace')

  // Solvent, returned: activities missing.
  const returned = silicaSheet(scene, ines, survey, 'TB-2561', 'D-131', 'Spraying of valve bodies', morning(4), solvent)
  hang(scene, returned, morning(4, '06:30'), { pump: 'TL-033', before: ['50.2', '50.0', '49.9'], unit: 'mL/min' }, 'Charcoal tube 100/50')
  returned.timer(morning(4, '06:30'), 'start', ids.pump('TL-033'))
  returned.timer(morning(4, '09:00'), 'stop', ids.pump('TL-033'))
  returned.readings(morning(4, '09:15'), 'after', ids.pump('TL-033'), ids.calibrator('PD-19'), 'Charcoal tube 100/50', ['49.6', '49.5', '49.7'], 'mL/min')
  returned.step(morning(4, '09:40'), 'hand-in', 0, false, 'Stopped early, worker was called away.', 'Ines Calderwood')
  decide(returned, 'return', office(3, '09:05'), 'Please note what was sprayed, with which gun, and for how long the booth door stood open.')

  const returnedTwice = silicaSheet(scene, tomas, survey, 'TB-2553', 'D-126', 'Core making', morning(5))
  stop = wholeShift(scene, returnedTwice, morning(5, '06:12'), { pump: 'BR-0411', before: ['2.21', '2.22', '2.20'], after: ['2.18', '2.17', '2.19'] })
  returnedTwice.activity(morning(5, '07:00'), 'Core shooter 2', morning(5, '11:00'))
  returnedTwice.step(addMinutes(stop, 30), 'hand-in', 0, true, null, 'Tomas Reedmace')
  decide(returnedTwice, 'return', office(4, '10:20'), 'Which lot of cassettes was this? The label in the photo shows another number.')

  // Accepted, and further.
  const accepted: [string, string, number][] = [['TB-2531', 'D-101', 7], ['TB-2532', 'D-102', 7], ['TB-2554', 'D-107', 5], ['TB-2571', 'D-114', 3]]
  accepted.forEach(([number, worker, day], index) => {
    const sheet = silicaSheet(scene, index < 2 ? orla : tomas, survey, number, worker, 'Fettling of manhole frames', morning(day))
    const flow = (2.2 + index / 100).toFixed(2)
    const end = wholeShift(scene, sheet, morning(day, `06:${20 + index * 3}`), { pump: ['BR-0411', 'BR-0412', 'BR-0412', 'BR-0418'][index]!, before: [flow, flow, flow], after: [(Number(flow) - 0.03).toFixed(2), flow, flow] }, { minutes: 460 })
    if (index === 0) sheet.set(morning(day, '15:30'), 'seal', 'S-4471')
    sheet.activity(morning(day, '07:30'), 'Disc cutting', morning(day, '09:00')).activity(morning(day, '09:10'), 'Chipping hammer', morning(day, '11:30'), { role: 'worker', id: ids.worker(worker), name: null })
    sheet.step(addMinutes(end, 35), 'hand-in', 0, true, null, index < 2 ? 'Orla Fenwick' : 'Tomas Reedmace')
    decide(sheet, 'accept', office(day - 2, '14:00'), null, true)
    if (index === 1) for (const transition of ['result', 'assess', 'release'] as const) decide(sheet, transition, office(1, '11:00'))
    if (index === 2) for (const transition of ['result', 'assess'] as const) decide(sheet, transition, office(1, '11:10'))
    if (index === 3) decide(sheet, 'result', office(1, '11:20'))
  })

  // Pump died; voided by the office.
  const died = silicaSheet(scene, ines, survey, 'TB-2563', 'D-114', 'Repair welding', morning(4), { ...metals, inletSide: 'inside-helmet' })
  hang(scene, died, morning(4, '06:15'), { pump: 'BR-0418', before: ['2.00', '1.99', '2.01'] }, CASSETTE)
  died.timer(morning(4, '06:15'), 'start', ids.pump('BR-0418'))
  died.fault(morning(4, '07:40'), ids.pump('BR-0418'), 'stopped', 'Found stopped, battery empty.')
  died.timer(morning(4, '07:41'), 'stop', ids.pump('BR-0418'))
  died.step(morning(4, '08:00'), 'hand-in', 0, false, 'Pump died.', 'Ines Calderwood')
  decide(died, 'void', office(3, '09:30'), 'Run too short and no flow after.')

  // Two handed in that share a number, and a swapped pump.
  const swapped = silicaSheet(scene, ines, survey, 'TB-2564', 'D-119', 'Charging and tapping', morning(4), metals)
  hang(scene, swapped, morning(4, '06:05'), { pump: 'BR-0411', before: ['2.00', '2.00', '2.01'] }, CASSETTE)
  swapped.timer(morning(4, '06:05'), 'start', ids.pump('BR-0411'))
  swapped.fault(morning(4, '09:30'), ids.pump('BR-0411'), 'flow-blocked', 'Fault light on.')
  swapped.readings(morning(4, '09:31'), 'before', ids.pump('BR-0412'), ids.calibrator('PD-19'), CASSETTE, ['1.98', '1.99', '1.98'])
  swapped.event(morning(4, '09:34'), 'pump-swap', { fromPumpId: ids.pump('BR-0411'), pumpId: ids.pump('BR-0412'), reason: 'fault' })
  swapped.timer(morning(4, '13:40'), 'stop', ids.pump('BR-0412'))
  swapped.readings(morning(4, '14:00'), 'after', ids.pump('BR-0412'), ids.calibrator('PD-19'), CASSETTE, ['1.95', '1.96', '1.95'])
  swapped.activity(morning(4, '06:30'), 'Tapping', morning(4, '09:00'))
  swapped.step(morning(4, '14:25'), 'hand-in', 0, false, 'First pump could not be read afterwards.', 'Ines Calderwood')

  const twin = silicaSheet(scene, ines, survey, 'TB-2564b', 'D-120', 'Ladle preparation', morning(4), { ...metals, number: 'TB-2564' })
  stop = wholeShift(scene, twin, morning(4, '06:25'), { pump: 'TE-207', before: ['2.1', '2.1', '2.05'], after: ['2.05', '2.05', '2.0'] }, { sampler: CASSETTE, minutes: 300, lunch: false })
  twin.activity(morning(4, '07:00'), 'Relining; said "it was <LOD last time" 👷', morning(4, '10:00'), { role: 'worker', id: ids.worker('D-120'), name: null })
  twin.step(addMinutes(stop, 20), 'hand-in', 0, false, 'Number was on two labels; checked with the crew.', 'Ines Calderwood')

  // Field blanks: both of the silica set, one of the two that the metals need.
  for (const number of ['TB-2539', 'TB-2549']) {
    const silicaBlank = orla.sheet(number, survey, morning(7, '08:00'), {
      number, kind: 'field-blank', air: 'none', methodId: ids.method('NMAM 7500'), samplerId: ids.sampler(HD_CYCLONE), medium: '5-um PVC, 37 mm', mediumLot: 'PV-2231', mediumExpiresOn: '2028-06-30',
      agentIds: [ids.agent('Silica, crystalline, respirable (quartz, cristobalite, tridymite)')],
    })
    silicaBlank.step(morning(7, '15:40'), 'hand-in', 0, true, null, 'Orla Fenwick')
    decide(silicaBlank, 'accept', office(5, '14:10'), null, true)
  }
  const blank = ines.sheet('TB-2569', survey, morning(4, '08:00'), {
    number: 'TB-2569', kind: 'field-blank', air: 'none', agentIds: metals.agentIds, methodId: metals.methodId, samplerId: metals.samplerId, medium: metals.medium, mediumLot: metals.mediumLot,
  })
  blank.note(morning(4, '08:02'), 'Opened and capped beside the pouring line.')
  blank.step(morning(4, '14:40'), 'hand-in', 0, true, null, 'Ines Calderwood')
}

function floorToMinutes(date: Date, minutes: number): string {
  const step = minutes * 60_000
  return new Date(Math.floor(date.getTime() / step) * step).toISOString()
}
