import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import { DEFAULT_SETTINGS } from '#shared/records/settings'
import FieldFlowPad from '~/components/field/FieldFlowPad.vue'
import { aFlowReading } from '../../../fixtures/builders'
import { wordsOf } from '../../words-of'

type Props = InstanceType<typeof FieldFlowPad>['$props']

async function mountPad(props: Partial<Props> = {}) {
  const pad = await mountSuspended(FieldFlowPad, {
    props: {
      'when': 'before', 'typed': '', 'unit': 'L/min', 'readings': [], 'beforeLitresPerMinute': null, 'settings': DEFAULT_SETTINGS, ...props,
      'onUpdate:typed': (typed: string) => pad.setProps({ typed }),
      'onUpdate:unit': (unit: 'L/min' | 'mL/min') => pad.setProps({ unit }),
    } as Props,
  })
  const button = (name: string) => pad.findAll('button').find(one => one.text() === name || one.attributes('aria-label') === name)!
  return {
    pad,
    press: async (...keys: string[]) => { for (const key of keys) await button(key).trigger('click') },
    keep: () => pad.findAll('button').find(one => one.text().startsWith('Keep reading'))!.trigger('click'),
    result: () => wordsOf(pad.get('[aria-label="Result so far"]').element),
    saved: () => pad.emitted('save') ?? [],
    entry: () => pad.get<HTMLInputElement>('input[inputmode]'),
  }
}

const three = (...typed: string[]) => typed.map(text => aFlowReading({ litresPerMinute: Number(text), typed: text }))

describe('FieldFlowPad', () => {
  it.each([['.', 'Point'], [',', 'Comma']] as const)('keeps what was typed with a %s letter for letter, and the number it means', async (separator, key) => {
    const { press, keep, saved, entry } = await mountPad({ separator })
    await press('2', key, '0', '5')
    expect(entry().element.value).toBe(`2${separator}05`)
    await keep()
    expect(saved()).toEqual([[{ typed: `2${separator}05`, unit: 'L/min', litresPerMinute: 2.05 }]])
  })

  it('takes mL/min for what it is and says what that is in L/min', async () => {
    const { pad, press, keep, saved } = await mountPad({ unit: 'L/min' })
    await pad.get('input[type=radio][aria-label="mL/min"]').setValue(true)
    await press('5', '0', 'Point', '2')
    expect(wordsOf(pad.element)).toContain('= 50.2 mL/min = 0.0502 L/min')
    await keep()
    expect(saved()).toEqual([[{ typed: '50.2', unit: 'mL/min', litresPerMinute: 0.0502 }]])
  })

  it.each([
    ['two points', ['2', 'Point', '0', 'Point'], 'two separators'],
    ['nothing', [], 'Type the flow first'],
    ['zero', ['0'], 'A flow is above 0'],
    ['litres that are millilitres', ['2', '0', '0', '0'], 'Is it mL/min?'],
  ])('keeps no reading of %s and says why', async (_, keys, words) => {
    const { pad, press, keep, saved, entry } = await mountPad()
    await press(...keys)
    await keep()
    expect(saved()).toEqual([])
    expect(wordsOf(pad.element)).toContain(words)
    expect(entry().attributes('aria-invalid')).toBe('true')
  })

  it('counts the typed reading into mean and spread while it is typed, and takes it out again', async () => {
    const { press, result } = await mountPad({ readings: three('2.00', '2.02') })
    expect(result()).toContain('Mean 2.010 L/min')
    await press('2', 'Point', '0', '7')
    expect(result()).toContain('Mean 2.030 L/min')
    expect(result()).toContain('Spread 2.0 %')
    await press('Delete the last digit', 'Delete the last digit', 'Delete the last digit', 'Delete the last digit')
    expect(result()).toContain('Mean 2.010 L/min')
  })

  it.each([
    ['1.95', '−2.5 %', 'within 5 %'],
    ['1.90', '−5.0 %', 'within 5 %'],
    ['1.89', '−5.5 %', 'beyond 5 %: give a reason'],
    ['1.70', '−15.0 %', 'beyond 10 %: not fit'],
  ])('gives the verdict on %s L/min after 2 L/min before', async (typed, change, verdict) => {
    const { press, result } = await mountPad({ when: 'after', beforeLitresPerMinute: 2 })
    await press(...[...typed].map(one => one === '.' ? 'Point' : one))
    expect(result()).toContain(`Change ${change}`)
    expect(result()).toContain(verdict)
  })

  it('says which reading lies far from the mean, and still keeps it', async () => {
    const { press, result, keep, saved } = await mountPad({ readings: three('2.00', '2.00') })
    await press('2', 'Point', '4')
    expect(result()).toContain('more than 5 % from the mean')
    await keep()
    expect(saved()).toHaveLength(1)
  })

  it('ends with Done only when enough readings are kept, and a further one can be typed', async () => {
    const { pad, press } = await mountPad({ readings: three('2.00', '2.01') })
    expect(wordsOf(pad.element)).toContain('One more reading to reach 3')
    expect(pad.text()).not.toContain('Done')
    await pad.setProps({ readings: three('2.00', '2.01', '2.02') } as Partial<Props>)
    expect(pad.text()).toContain('Done, 3 readings')
    await press('2')
    expect(pad.text()).toContain('Keep reading 4')
  })

  it('hands a kept reading over to be corrected', async () => {
    const readings = three('2.00', '2.01')
    const { pad } = await mountPad({ readings })
    await pad.findAll('button').find(one => wordsOf(one.element).startsWith('Correct reading 2:'))!.trigger('click')
    expect(pad.emitted('correct')).toEqual([[readings[1]]])
  })
})
