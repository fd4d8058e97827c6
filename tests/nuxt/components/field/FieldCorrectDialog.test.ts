import { mountSuspended } from '@nuxt/test-utils/runtime'
import { afterEach, describe, expect, it } from 'vitest'
import FieldCorrectDialog from '~/components/field/FieldCorrectDialog.vue'
import FieldEventList from '~/components/field/FieldEventList.vue'
import type { SheetEvent } from '#shared/records/sheet-event'
import { aFlowCheck, aFlowReading, aTimer, anActivity, anEvent, takenBack } from '../../../fixtures/builders'
import { tap } from '../../tap'
import { wordsOf } from '../../words-of'

type Props = InstanceType<typeof FieldCorrectDialog>['$props']

const NOW = '2026-03-03T16:00:00.000Z'
const nameOf = (id: string) => `name of ${id.slice(-1)}`

let count = 0

async function openDialog(event: SheetEvent, mode: 'correct' | 'take-back' = 'correct') {
  const dialog = await mountSuspended(FieldCorrectDialog, {
    props: { event, mode, zone: 'UTC', nowAt: NOW, nameOf, draftKey: `correct-${count++}` } as Props, attachTo: document.body,
  })
  return {
    dialog,
    words: () => wordsOf(dialog.element),
    value: () => dialog.get<HTMLInputElement>('input[type=text]'),
    reason: (text: string) => dialog.get('textarea').setValue(text),
    save: () => tap(dialog.findAll('button').find(one => /^(Correct it|Take it back)$/.test(one.text()))!),
  }
}

afterEach(() => { document.body.replaceChildren() })

describe('FieldCorrectDialog', () => {
  it('corrects a flow only with a reason, and says what it will be read as', async () => {
    const reading = aFlowReading({ litresPerMinute: 2.51, typed: '2.51' })
    const { dialog, value, words, reason, save } = await openDialog(reading)
    expect(value().element.value).toBe('2.51')
    await value().setValue('2,15')
    expect(words()).toContain('= 2.15 L/min')
    await save()
    expect(dialog.emitted('correct')).toBeUndefined()
    expect(words()).toContain('Give the reason. It stays beside the first value.')
    await reason('Typed wrong')
    await save()
    expect(dialog.emitted('correct')).toEqual([[reading.id, { data: { ...reading.data, typed: '2,15', litresPerMinute: 2.15 } }, 'Typed wrong']])
  })

  it('refuses a flow that is no number and a correction that changes nothing', async () => {
    const { dialog, value, words, reason, save } = await openDialog(aFlowReading())
    await reason('Typed wrong')
    await save()
    expect(words()).toContain('Nothing is changed yet.')
    await value().setValue('two')
    await save()
    expect(words()).toContain('This is not a number.')
    expect(dialog.emitted('correct')).toBeUndefined()
  })

  it('moves a start to the time it really happened', async () => {
    const start = aTimer('start', '07:10')
    const { dialog, reason, save } = await openDialog(start)
    await dialog.get('input[type=checkbox]').setValue(true)
    await dialog.get('input[type=time]').setValue('07:02')
    await reason('Pressed late')
    await save()
    expect(dialog.emitted('correct')).toEqual([[start.id, { at: '2026-03-03T07:02:00.000Z' }, 'Pressed late']])
  })

  it('moves nothing into the future', async () => {
    const { dialog, words, reason, save } = await openDialog(aTimer('stop', '15:00'))
    await dialog.get('input[type=checkbox]').setValue(true)
    await dialog.get('input[type=time]').setValue('16:30')
    await reason('Pressed late')
    await save()
    expect(dialog.emitted('correct')).toBeUndefined()
    expect(words()).toContain('That time is still to come.')
  })

  it('corrects the pump’s own minutes of a check that has no flow', async () => {
    const check = aFlowCheck('09:00', { typed: '', litresPerMinute: null, pumpMinutes: 210 })
    const { dialog, value, reason, save } = await openDialog(check)
    expect(value().element.value).toBe('210')
    await value().setValue('120')
    await reason('Typed wrong')
    await save()
    expect(dialog.emitted('correct')).toEqual([[check.id, { data: { ...check.data, pumpMinutes: 120 } }, 'Typed wrong']])
  })

  it('keeps words letter for letter', async () => {
    const words = 'Said "it was <LOD> last time", 2 × 30 min 👷'
    const activity = anActivity('08:00', 'Sanding')
    const { dialog, value, reason, save } = await openDialog(activity)
    await value().setValue(words)
    await reason('Typed wrong')
    await save()
    expect(dialog.emitted('correct')).toMatchObject([[activity.id, { data: { text: words } }, 'Typed wrong']])
  })

  it('takes back only with a reason', async () => {
    const note = anEvent('note', { text: 'Wrong sheet' })
    const { dialog, reason, save } = await openDialog(note, 'take-back')
    await save()
    expect(dialog.emitted('takeBack')).toBeUndefined()
    await reason('Wrong sheet')
    await save()
    expect(dialog.emitted('takeBack')).toEqual([[note.id, 'Wrong sheet']])
  })
})

describe('what was corrected', () => {
  it('keeps the first value in sight, struck through, with the reason', async () => {
    const first = aFlowReading({ litresPerMinute: 2.51, typed: '2.51' })
    const second = aFlowReading({ litresPerMinute: 2.15, typed: '2.15' }, { corrects: first.id, reason: 'Typed wrong' })
    const list = await mountSuspended(FieldEventList, { props: { events: [takenBack(first, 'Typed wrong'), second], zone: 'UTC', nowAt: NOW, nameOf, canEdit: true } })
    expect(list.findAll('s').map(one => wordsOf(one.element)).join()).toContain('2.51 L/min')
    expect(wordsOf(list.element)).toContain('2.15 L/min')
    expect(wordsOf(list.element)).toContain('Corrected: Typed wrong')
  })
})
