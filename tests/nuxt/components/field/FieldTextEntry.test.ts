import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it, vi } from 'vitest'
import FieldSetUpWhat from '~/components/field/FieldSetUpWhat.vue'
import FieldTextEntry from '~/components/field/FieldTextEntry.vue'
import { aBundle } from '../../../fixtures/builders'
import { wordsOf } from '../../words-of'

type Props = InstanceType<typeof FieldTextEntry>['$props']

let count = 0

async function mountEntry(props: Partial<Props> = {}) {
  const save = vi.fn<(text: string | null) => Promise<unknown>>(async () => true)
  const entry = await mountSuspended(FieldTextEntry, { props: { label: 'Task', value: null, draftKey: `entry-${count++}`, save, ...props } as Props })
  const input = () => entry.get<HTMLInputElement>('input, textarea')
  return { entry, save, input, type: async (text: string) => { await input().setValue(text); await input().trigger('blur') } }
}

describe('FieldTextEntry', () => {
  it('keeps 200 characters with quotes, signs and emoji as they were typed', async () => {
    const { save, type } = await mountEntry({ multiline: true })
    const text = `Said "it was <LOD" & 'fine' 👷 ${'x'.repeat(170)}`
    await type(text)
    expect(save).toHaveBeenCalledExactlyOnceWith(text)
  })

  it('takes a field that was emptied for empty', async () => {
    const { save, type } = await mountEntry({ value: 'Sanding' })
    await type('   ')
    expect(save).toHaveBeenCalledExactlyOnceWith(null)
  })

  it('says that the phone did not keep it, leaves the words where they are, and tries again', async () => {
    const { entry, save, input, type } = await mountEntry()
    save.mockResolvedValueOnce(false)
    await type('Welding')
    await expect.poll(() => wordsOf(entry.element)).toContain('Not saved yet')
    expect(input().element.value).toBe('Welding')
    await input().trigger('blur')
    expect(save).toHaveBeenCalledTimes(2)
    await expect.poll(() => wordsOf(entry.element)).not.toContain('Not saved yet')
  })

  it('does not let a value from elsewhere overwrite what is being typed', async () => {
    const { entry, input } = await mountEntry({ value: 'Sanding' })
    await input().setValue('Sanding of do')
    await entry.setProps({ value: 'Welding' } as Partial<Props>)
    expect(input().element.value).toBe('Sanding of do')
  })
})

describe('the uptake rate of a diffusive sampler', () => {
  it.each([['13,5', 13.5], ['13.5', 13.5]])('reads %s', async (typed, value) => {
    const { set, type } = await mountUptake()
    await type(typed)
    expect(set).toHaveBeenCalledExactlyOnceWith('uptakeMillilitresPerMinute', value)
  })

  it.each([['13 or so', 'This is not a number'], ['0', 'above 0'], ['1.2.3', 'two separators']])('does not pass over %s in silence', async (typed, words) => {
    const { set, what, type } = await mountUptake()
    await type(typed)
    expect(set).not.toHaveBeenCalled()
    expect(wordsOf(what.element)).toContain(words)
  })
})

async function mountUptake() {
  const set = vi.fn(async () => true)
  const what = await mountSuspended(FieldSetUpWhat, {
    props: {
      bundle: aBundle({ sheet: { air: 'diffusive' }, document: { id: `uptake-${count++}` } }), todayOn: '2026-03-03', set,
      reference: { people: [], workers: [], pumps: [], calibrators: [], samplers: [], agents: [], methods: [], exposureGroups: [], surveys: [], planLines: [] },
      recent: { methodIds: [], agentIds: [], samplerIds: [], lots: [] },
    } as unknown as InstanceType<typeof FieldSetUpWhat>['$props'],
  })
  const input = what.findAll('label').find(one => one.text().startsWith('Uptake rate'))!.attributes('for')!
  return { set, what, type: async (text: string) => { await what.get(`#${input}`).setValue(text); await what.get(`#${input}`).trigger('blur') } }
}
