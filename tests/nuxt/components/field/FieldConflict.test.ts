import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import FieldConflict from '~/components/field/FieldConflict.vue'
import { wordsOf } from '../../words-of'

const conflict = {
  field: 'task', isOpen: true,
  values: [
    { opId: 'op-1', value: 'Sanding "doors" <LOD', author: 'person-1', at: '2026-03-03T09:10:00.000Z', dev: 'd_phone-aaaa', isCurrent: false },
    { opId: 'op-2', value: 'Grinding', author: 'person-2', at: '2026-03-03T09:12:00.000Z', dev: 'd_phone-bbbb', isCurrent: true },
  ],
}
const names: Record<string, string> = { 'person-1': 'Orla Fenwick', 'person-2': 'Tomas Reedmace' }

function mountConflict(props: Record<string, unknown> = {}) {
  return mountSuspended(FieldConflict, { props: { conflict, zone: 'UTC', nameOf: (id: string) => names[id] ?? id, canEdit: true, ownDev: 'd_phone-bbbb', ...props } })
}

describe('FieldConflict', () => {
  it('shows both values, each with who, when and on which phone', async () => {
    const shown = (await mountConflict()).findAll('button').map(one => wordsOf(one.element))
    expect(shown).toHaveLength(2)
    expect(shown[0]).toContain('Sanding "doors" <LOD')
    expect(shown[0]).toMatch(/Orla Fenwick, .*09:10.*, phone aaaa/)
    expect(shown[1]).toMatch(/Grinding .*Tomas Reedmace, .*09:12.*, this phone/)
    expect(shown[1]).toContain('on the sheet now')
    expect(shown[0]).not.toContain('on the sheet now')
  })

  it('names the field in words', async () => {
    expect(wordsOf((await mountConflict()).element)).toContain('Task: two phones, two values')
  })

  it('takes the value that is tapped, the one on the sheet as well', async () => {
    const shown = await mountConflict()
    await shown.findAll('button')[0]!.trigger('click')
    await shown.findAll('button')[1]!.trigger('click')
    expect(shown.emitted('choose')).toEqual([['task', 'Sanding "doors" <LOD'], ['task', 'Grinding']])
  })

  it('lets nobody choose on a sheet that may not be changed', async () => {
    const shown = await mountConflict({ canEdit: false })
    await shown.findAll('button')[0]!.trigger('click')
    expect(shown.emitted('choose')).toBeUndefined()
    expect(wordsOf(shown.element)).toContain('Grinding')
  })
})
