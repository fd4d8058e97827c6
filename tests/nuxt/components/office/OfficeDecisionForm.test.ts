import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import OfficeDecisionForm from '~/components/office/OfficeDecisionForm.vue'
import { DECISIONS } from '~/utils/decision'

type Props = InstanceType<typeof OfficeDecisionForm>['$props']

function mountForm(props: Partial<Props> = {}) {
  return mountSuspended(OfficeDecisionForm, {
    props: { state: 'handed-in', revision: 3, isFit: true, stopCount: 0, allowed: ['accept', 'return', 'void'], ...props } as Props,
  })
}

type Form = Awaited<ReturnType<typeof mountForm>>

async function press(form: Form, words: string) {
  await form.findAll('button').find(button => button.text() === words)!.trigger('click')
}

async function submit(form: Form, reason?: string) {
  if (reason !== undefined) await form.get('textarea').setValue(reason)
  await form.get('form').trigger('submit')
}

describe('OfficeDecisionForm', () => {
  it('shows only the steps that are allowed, and says so where there is none', async () => {
    const form = await mountForm({ allowed: ['void'] })
    expect(form.findAll('button').map(button => button.text())).toEqual(['Void'])
    const none = await mountForm({ state: 'open', allowed: [] })
    expect(none.findAll('button')).toHaveLength(0)
    expect(none.text()).toContain('nothing to decide until it is handed in')
  })

  it('accepts a sheet with nothing against it as fit, on the revision shown, without a reason', async () => {
    const form = await mountForm()
    await press(form, 'Accept')
    await submit(form)
    expect(form.emitted('decide')).toEqual([[{ transition: 'accept', expect: 3, fit: true, reason: null }]])
  })

  it('does not use a sheet with a stop finding without a reason, and with one does not call it fit', async () => {
    const form = await mountForm({ stopCount: 2 })
    await press(form, 'Accept')
    await submit(form, '   ')
    expect(form.emitted('decide')).toBeUndefined()
    expect(form.text()).toContain('Give the reason')
    await submit(form, 'The laboratory weighed it twice.')
    expect(form.emitted('decide')).toEqual([[{ transition: 'accept', expect: 3, fit: false, reason: 'The laboratory weighed it twice.' }]])
  })

  it('asks for a reason to use what was handed in as not fit', async () => {
    const form = await mountForm({ isFit: false })
    await press(form, 'Accept')
    expect(form.text()).toContain('it was handed in as not fit')
    await submit(form)
    expect(form.emitted('decide')).toBeUndefined()
  })

  it.each(DECISIONS.filter(step => step !== 'accept'))('never takes "%s" without a reason', async (step) => {
    const form = await mountForm({ state: step === 'reopen' ? 'accepted' : 'handed-in', allowed: [step] })
    await form.get('button').trigger('click')
    await submit(form)
    expect(form.emitted('decide')).toBeUndefined()
    await submit(form, 'Because')
    expect(form.emitted('decide')).toEqual([[{ transition: step, expect: 3, fit: null, reason: 'Because' }]])
  })

  it('says a refusal at once and keeps the reason that was typed', async () => {
    const form = await mountForm()
    await press(form, 'Return')
    await submit(form, 'Which lot?')
    await form.setProps({ refusal: 'The sheet has moved on.', revision: 4 } as Partial<Props>)
    expect(form.get('[role=alert]').text()).toContain('The sheet has moved on.')
    expect(form.get('textarea').element.value).toBe('Which lot?')
  })

  it('forgets the reason once the step was taken', async () => {
    const form = await mountForm()
    await press(form, 'Return')
    await submit(form, 'Which lot?')
    await form.setProps({ state: 'returned', revision: 4, allowed: [] } as Partial<Props>)
    expect(form.find('textarea').exists()).toBe(false)
  })
})
