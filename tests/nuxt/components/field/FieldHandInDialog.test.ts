import { mountSuspended } from '@nuxt/test-utils/runtime'
import { afterEach, describe, expect, it } from 'vitest'
import { nextTick } from 'vue'
import type { Finding, Gap } from '#shared/assessment/sheet-assessment'
import FieldHandInDialog from '~/components/field/FieldHandInDialog.vue'
import { tap } from '../../tap'
import { wordsOf } from '../../words-of'

type Props = InstanceType<typeof FieldHandInDialog>['$props']

function aFinding(severity: Finding['severity'], title: string, answer: Finding['answer'] = null): Finding {
  return { code: title, severity, subject: '', part: 'air', title, whatNow: '', numbers: [], rule: '', source: '', answer } as Finding
}

const GAPS: Gap[] = [{ code: 'flow-after', part: 'flow-after', title: 'No flow after was read.' }, { code: 'agents', part: 'set-up', title: 'No agent is chosen.' }]

let count = 0

async function openDialog(props: Partial<Props> = {}) {
  const dialog = await mountSuspended(FieldHandInDialog, {
    props: { open: false, canBeFit: true, findings: [], gaps: [], personName: 'Orla Fenwick', draftKey: `hand-in-${count++}`, sampleName: 'W-01 · A-001', ...props } as Props,
    attachTo: document.body,
  })
  await dialog.setProps({ open: true } as Partial<Props>)
  await nextTick()
  const radio = (label: string) => dialog.findAll<HTMLInputElement>('input[type=radio]').find(one => dialog.get(`label[for="${one.attributes('id')}"]`).text() === label)
  return {
    dialog, radio,
    words: () => wordsOf(dialog.element),
    choose: (label: string) => radio(label)!.setValue(true),
    handIn: () => tap(dialog.findAll('button').find(one => one.text().startsWith('Hand in'))!),
    handedIn: () => dialog.emitted('handIn') ?? [],
  }
}

afterEach(() => { document.body.replaceChildren() })

describe('FieldHandInDialog', () => {
  it('hands in as fit without a reason, signed with the person’s own name', async () => {
    const { choose, handIn, handedIn } = await openDialog()
    await choose('Fit to use')
    await handIn()
    expect(handedIn()).toEqual([[{ fit: true, reason: null, name: 'Orla Fenwick' }]])
  })

  it('decides nothing for the person where both ways are open', async () => {
    const { handIn, handedIn, words } = await openDialog()
    await handIn()
    expect(handedIn()).toEqual([])
    expect(words()).toContain('Say whether it is fit to use.')
  })

  it('takes not fit only with a reason', async () => {
    const { dialog, choose, handIn, handedIn, words } = await openDialog()
    await choose('Not fit')
    await handIn()
    expect(handedIn()).toEqual([])
    expect(words()).toContain('Say why it is not fit.')
    await dialog.get('textarea').setValue('  Pump fell into the pit  ')
    await handIn()
    expect(handedIn()).toEqual([[{ fit: false, reason: 'Pump fell into the pit', name: 'Orla Fenwick' }]])
  })

  it('takes a usual reason in one tap', async () => {
    const { dialog, choose, handIn, handedIn } = await openDialog()
    await choose('Not fit')
    await dialog.findAll('button').find(one => one.text() === 'Pump stopped')!.trigger('click')
    await handIn()
    expect(handedIn()).toMatchObject([[{ fit: false, reason: 'Pump stopped' }]])
  })

  it('lists every gap and every finding in the way, offers no fit, and still lets the sheet go', async () => {
    const { words, radio, dialog, handIn, handedIn } = await openDialog({
      canBeFit: false, gaps: GAPS,
      findings: [aFinding('stop', 'The flow changed by 15 %.'), aFinding('attention', 'A pause has no reason.'), aFinding('note', 'Nothing of weight.'),
        { ...aFinding('attention', 'Two values for one field.'), code: 'open-conflict' },
        aFinding('attention', 'Answered already.', { reason: 'Looked at', author: '', at: '2026-03-03T15:00:00.000Z' } as Finding['answer'])],
    })
    for (const title of ['No flow after was read.', 'No agent is chosen.', 'The flow changed by 15 %.', 'A pause has no reason. (needs a reason)']) expect(words()).toContain(title)
    expect(words()).not.toContain('Nothing of weight.')
    expect(words()).not.toContain('Two values for one field.')
    expect(words()).not.toContain('Answered already.')
    expect(radio('Fit to use')).toBeUndefined()
    expect(radio('Not fit')!.element.checked).toBe(true)
    await dialog.get('textarea').setValue('Worker left early')
    await handIn()
    expect(handedIn()).toEqual([[{ fit: false, reason: 'Worker left early', name: 'Orla Fenwick' }]])
  })

  it('asks for a name where none is left', async () => {
    const { dialog, choose, handIn, handedIn, words } = await openDialog()
    await choose('Fit to use')
    await dialog.get('input[autocomplete=name]').setValue(' ')
    await handIn()
    expect(handedIn()).toEqual([])
    expect(words()).toContain('Sign with your name.')
  })

  it('keeps the reason and says so when the phone could not keep the step', async () => {
    const { dialog, choose, words } = await openDialog()
    await choose('Not fit')
    await dialog.get('textarea').setValue('Torn filter')
    await dialog.setProps({ problem: 'Not saved. The phone did not keep this.' } as Partial<Props>)
    expect(words()).toContain('Not saved. The phone did not keep this.')
    expect(dialog.get('textarea').element.value).toBe('Torn filter')
  })
})
