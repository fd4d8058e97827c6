import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import UiCheck from '~/components/ui/UiCheck.vue'
import UiChecks from '~/components/ui/UiChecks.vue'
import UiChoice from '~/components/ui/UiChoice.vue'
import UiSelect from '~/components/ui/UiSelect.vue'

const reasons = [
  { value: 'break', label: 'Break' },
  { value: 'left-area', label: 'Left the area', hint: 'Write where to' },
]

describe('UiChoice', () => {
  it('is a group of native radio buttons, each named by its words', async () => {
    const choice = await mountSuspended(UiChoice, { props: { legend: 'Why was it paused?', options: reasons, modelValue: null } })
    expect(choice.get('legend').text()).toBe('Why was it paused?')
    const inputs = choice.findAll('input[type=radio]')
    expect(new Set(inputs.map(input => input.attributes('name'))).size).toBe(1)
    expect(inputs.map(input => choice.get(`label[for="${input.attributes('id')}"]`).text())).toEqual(['Break', 'Left the area'])
    await inputs[1]?.setValue(true)
    expect(choice.emitted('update:modelValue')?.at(-1)).toEqual(['left-area'])
  })

  it('gives its first choice the id an error summary leads to, and tells the error there', async () => {
    const choice = await mountSuspended(UiChoice, { props: { legend: 'Why?', options: reasons, id: 'pause-reason', error: 'Choose why it was paused' } })
    const first = choice.get('#pause-reason')
    expect(first.element.tagName).toBe('INPUT')
    expect(choice.get(`#${first.attributes('aria-describedby')}`).text()).toBe('Error: Choose why it was paused')
    const ids = choice.findAll('[id]').map(one => one.attributes('id'))
    expect(new Set(ids).size).toBe(ids.length)
  })
})

describe('UiChecks', () => {
  it('adds and takes away without touching the others', async () => {
    const checks = await mountSuspended(UiChecks, { props: { legend: 'The train', options: reasons, modelValue: ['break'] } })
    const [first, second] = checks.findAll('input[type=checkbox]')
    await second?.setValue(true)
    expect(checks.emitted('update:modelValue')?.at(-1)).toEqual([['break', 'left-area']])
    await first?.setValue(false)
    expect(checks.emitted('update:modelValue')?.at(-1)).toEqual([['left-area']])
  })
})

describe('UiCheck', () => {
  it('is one native checkbox', async () => {
    const check = await mountSuspended(UiCheck, { props: { label: 'Leak check passed', modelValue: false } })
    await check.get('input[type=checkbox]').setValue(true)
    expect(check.emitted('update:modelValue')).toEqual([[true]])
  })
})

describe('UiSelect', () => {
  it('says "Choose" until something is chosen, and gives null back for the empty choice', async () => {
    const select = await mountSuspended(UiSelect, { props: { label: 'Pump', options: [{ value: 'p4', label: 'Pump 4' }], empty: 'No pump', modelValue: null } })
    await select.get('select').setValue('p4')
    expect(select.emitted('update:modelValue')?.at(-1)).toEqual(['p4'])
    await select.get('select').setValue('')
    expect(select.emitted('update:modelValue')?.at(-1)).toEqual([null])
    const must = await mountSuspended(UiSelect, { props: { label: 'Pump', options: [{ value: 'p4', label: 'Pump 4' }], modelValue: null } })
    expect(must.get('option').text()).toBe('Choose')
    expect(must.get('option').attributes('disabled')).toBeDefined()
  })
})
