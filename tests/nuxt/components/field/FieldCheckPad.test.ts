import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import { DEFAULT_SETTINGS } from '#shared/records/settings'
import FieldCheckPad from '~/components/field/FieldCheckPad.vue'
import { wordsOf } from '../../words-of'

type Props = InstanceType<typeof FieldCheckPad>['$props']

async function mountPad(props: Partial<Props> = {}) {
  const pad = await mountSuspended(FieldCheckPad, {
    props: {
      'flow': '', 'minutes': '', 'unit': 'L/min', 'setLitresPerMinute': 2, 'settings': DEFAULT_SETTINGS, 'hasPumpTimer': true, 'sheetMinutes': 120, ...props,
      'onUpdate:flow': (flow: string) => pad.setProps({ flow }),
      'onUpdate:minutes': (minutes: string) => pad.setProps({ minutes }),
    } as Props,
  })
  return {
    pad,
    press: async (...keys: string[]) => {
      for (const key of keys) await pad.findAll('button').find(one => one.text() === key || one.attributes('aria-label') === key)!.trigger('click')
    },
    save: () => pad.findAll('button').find(one => one.text() === 'Save the check')!.trigger('click'),
    entry: (label: string) => pad.findAll<HTMLInputElement>('input[inputmode]').find(one => pad.get(`label[for="${one.attributes('id')}"]`).text().startsWith(label))!,
    words: () => wordsOf(pad.element),
  }
}

describe('FieldCheckPad', () => {
  it('writes the keys into the line that was touched last', async () => {
    const { pad, press, save, entry } = await mountPad()
    await press('2', 'Point', '1')
    await entry('Pump’s minutes').trigger('focus')
    await press('1', '1', '8')
    await save()
    expect(pad.emitted('save')).toEqual([[{ typed: '2.1', unit: 'L/min', litresPerMinute: 2.1, pumpMinutes: 118 }]])
  })

  it.each([['2.1', '+5.0 %', 'within 5 %'], ['2.11', '+5.5 %', 'beyond 5 %: give a reason'], ['1.7', '−15.0 %', 'beyond 10 %: not fit']])('holds %s L/min against the 2 L/min it was set to', async (flow, away, verdict) => {
    const { words } = await mountPad({ flow })
    expect(words()).toContain(`Away from the start ${away}`)
    expect(words()).toContain(verdict)
  })

  it('compares the pump’s own minutes with the sheet’s', async () => {
    const { pad, words } = await mountPad({ minutes: '117' })
    expect(words()).toContain('within 5 min')
    await pad.setProps({ minutes: '100' } as Partial<Props>)
    expect(words()).toContain('apart by more than 5 min')
  })

  it('takes either of the two alone, and asks where both are missing', async () => {
    const empty = await mountPad()
    await empty.save()
    expect(empty.words()).toContain('Type the flow, the pump’s minutes, or both.')
    expect(empty.pad.emitted('save')).toBeUndefined()
    const minutesOnly = await mountPad({ minutes: '60' })
    await minutesOnly.save()
    expect(minutesOnly.pad.emitted('save')).toEqual([[{ typed: '', unit: 'L/min', litresPerMinute: null, pumpMinutes: 60 }]])
  })

  it('saves nothing that it cannot read, and keeps what was typed', async () => {
    const { pad, save, words, entry } = await mountPad({ flow: '2.0.1' })
    await save()
    expect(pad.emitted('save')).toBeUndefined()
    expect(words()).toContain('two separators')
    expect(entry('Flow now').element.value).toBe('2.0.1')
  })

  it('asks for no minutes of a pump without a timer', async () => {
    const { pad } = await mountPad({ hasPumpTimer: false })
    expect(pad.text()).not.toContain('Pump’s minutes')
  })
})
