import { mountSuspended } from '@nuxt/test-utils/runtime'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { effectScope } from 'vue'
import { useStartSheet } from '~/composables/useStartSheet'
import { NotSaved } from '~/local/commit'
import * as commitModule from '~/local/commit'
import { rememberPerson } from '~/local/device'
import SheetPage from '~/pages/field/sheets/[sheetId]/index.vue'
import { useSessionStore } from '~/stores/session'
import { aPerson, SURVEY } from '../local/phone'
import { tap } from '../tap'
import { wordsOf } from '../words-of'

vi.mock('~/local/commit', async original => ({ ...await original<typeof import('~/local/commit')>() }))

const scope = effectScope()
let page: Awaited<ReturnType<typeof mountSuspended>> | undefined

beforeEach(() => { window.scrollTo = vi.fn() as typeof window.scrollTo })

// Databases are left open: each test works for a person of its own, and a page that goes away may still be reading its drafts.
afterEach(() => {
  page?.unmount()
  vi.restoreAllMocks()
})

/** A diffusive area sample just started from nothing, on its page. */
async function openSheet() {
  const person = aPerson('One')
  await rememberPerson(person)
  const start = scope.run(useStartSheet)!
  await expect.poll(() => useSessionStore().fieldStore?.person.id).toBe(person.id)
  const sheetId = await start.fromNothing({ surveyId: SURVEY, kind: 'area', air: 'diffusive' })
  const opened = await mountSuspended(SheetPage, { route: `/field/sheets/${sheetId}`, attachTo: document.body })
  page = opened
  await expect.poll(() => opened.find('.field-actions').exists()).toBe(true)
  const button = (name: string) => opened.findAll('button').find(one => wordsOf(one.element) === name)
  return { opened, button, words: () => wordsOf(opened.element) }
}

describe('the page of a sheet', () => {
  it('offers no way back to a running clock once the sheet is handed in', async () => {
    const { opened, button, words } = await openSheet()
    await tap(button('Start')!)
    await expect.poll(() => button('Stop')).toBeDefined()
    await tap(button('Stop')!)
    await expect.poll(words).toMatch(/Stopped \d\d:\d\d:\d\d Undo/)
    await tap(button('Hand in')!)
    await opened.get('dialog[open] textarea').setValue('Sampler fell down')
    await tap(opened.get('dialog[open]').findAll('button').find(one => one.text() === 'Hand in as not fit')!)
    await expect.poll(words).toContain('Handed in, waiting to send')
    expect(button('Undo')).toBeUndefined()
    expect(words()).toContain('Not fit: Sampler fell down')
  })

  it('says in sight what the phone did not keep', async () => {
    const { opened, words } = await openSheet()
    vi.spyOn(commitModule, 'commit').mockRejectedValue(new NotSaved('full'))
    vi.spyOn(console, 'error').mockReturnValue()
    await opened.findAll<HTMLInputElement>('input[type=radio]').find(one => opened.find(`label[for="${one.attributes('id')}"]`).text() === 'A usual day')!.setValue(true)
    await expect.poll(() => opened.find('.field-actions').text()).toContain('not saved')
    expect(words()).toContain('Free some space on the phone')
  })

  it('has one main action at a time', async () => {
    const { opened, button } = await openSheet()
    const primaries = () => opened.findAll('.ui-button-primary').map(one => wordsOf(one.element))
    expect(primaries()).toEqual(['Start'])
    await tap(button('Start')!)
    await expect.poll(primaries).toEqual(['Pause'])
  })
})
