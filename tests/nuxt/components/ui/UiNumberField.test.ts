import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import UiNumberField from '~/components/ui/UiNumberField.vue'

const flow = { label: 'First reading', unit: 'L/min' }

describe('UiNumberField', () => {
  it('keeps what was typed and shows the reading with its unit, with a comma or a point', async () => {
    const field = await mountSuspended(UiNumberField, { props: { ...flow, modelValue: '' } })
    const input = field.get('input')
    await input.setValue('2,05')
    expect(field.emitted('update:modelValue')?.at(-1)).toEqual(['2,05'])
    expect(field.emitted('reading')?.at(-1)).toEqual([{ ok: true, value: 2.05, decimals: 2, significant: 3 }])
    expect(field.text()).toContain('= 2.05 L/min')
    await input.setValue('1.250')
    expect(field.text()).toContain('= 1.250 L/min')
  })

  it('asks for the decimal keypad and is a text field, so that nothing is rounded or scrolled away', async () => {
    const input = (await mountSuspended(UiNumberField, { props: flow })).get('input')
    expect(input.attributes()).toMatchObject({ type: 'text', inputmode: 'decimal', autocomplete: 'off' })
  })

  it('complains about a number that would have to be guessed, but not while it is being typed', async () => {
    const field = await mountSuspended(UiNumberField, { props: { ...flow, modelValue: '' }, attachTo: document.body })
    const input = field.get('input')
    await input.trigger('focus')
    await input.setValue('1.234,5')
    expect(field.text()).not.toContain('thousands')
    await input.trigger('blur')
    expect(field.text()).toContain('Leave out the separators between thousands')
    expect(input.attributes('aria-invalid')).toBe('true')
    expect(input.element.value).toBe('1.234,5')
    field.unmount()
  })

  it('ties its hint, its error and the reading to the field', async () => {
    const field = await mountSuspended(UiNumberField, { props: { ...flow, id: 'flow-1', hint: 'With the sampler in line', error: 'Say how high the flow was', modelValue: '2' } })
    const describedBy = field.get('input').attributes('aria-describedby')?.split(' ') ?? []
    expect(describedBy.map(id => field.get(`#${id}`).text())).toEqual([
      'With the sampler in line', 'Error: Say how high the flow was', '= 2 L/min',
    ])
    expect(field.get('label').attributes('for')).toBe('flow-1')
  })

  it('has keys for the minus and the "less than" that a phone\'s keypad lacks', async () => {
    const field = await mountSuspended(UiNumberField, { props: { ...flow, unit: 'µg', modelValue: '0.5', allowBelow: true, allowNegative: true } })
    const [below, sign] = field.findAll('button')
    await below?.trigger('click')
    expect(field.emitted('update:modelValue')?.at(-1)).toEqual(['<0.5'])
    expect(field.text()).toContain('less than 0.5 µg')
    await below?.trigger('click', { timeStamp: 9_999_999 })
    await sign?.trigger('click')
    expect(field.emitted('update:modelValue')?.at(-1)?.[0]).toContain('-')
  })
})
