import { mockNuxtImport, mountSuspended, registerEndpoint } from '@nuxt/test-utils/runtime'
import { createError } from 'h3'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import OfficePerson from '~/components/office/OfficePerson.vue'

const { navigateTo } = vi.hoisted(() => ({ navigateTo: vi.fn() }))
mockNuxtImport('navigateTo', () => navigateTo)

const MAREN = {
  id: '01890000-0000-7000-8000-000000000001', organisationId: '01890000-0000-7000-8000-000000000002',
  organisationName: 'Invented Works', name: 'Maren Example', email: 'maren@example.test', roles: ['reviewer' as const],
}
let isServerUp = true
let deletes = 0

registerEndpoint('/api/session', {
  method: 'DELETE',
  handler: () => {
    deletes += 1
    if (!isServerUp) throw createError({ statusCode: 503 })
    return { ok: true }
  },
})

beforeEach(() => {
  isServerUp = true
  deletes = 0
  navigateTo.mockReset()
  useSessionStore().signedIn = MAREN
})

afterEach(() => {
  useSessionStore().signedIn = null
  localStorage.clear()
  usePreferencesStore().setTheme('day')
})

async function press(words: string) {
  const person = await mountSuspended(OfficePerson)
  await person.findAll('button').find(button => button.text().includes(words))!.trigger('click')
  return person
}

describe('OfficePerson', () => {
  it('names who is signed in, and where', async () => {
    const person = await mountSuspended(OfficePerson)
    expect(person.text()).toContain('Maren Example')
    expect(person.text()).toContain('Invented Works')
  })

  it('changes the theme, on a button that says to which', async () => {
    const person = await press('Change to theme Sun')
    expect(document.documentElement.dataset.theme).toBe('sun')
    expect(person.text()).toContain('Change to theme Day')
  })

  it('goes to the sign-in page only after the server has ended the session', async () => {
    await press('Sign out')
    await expect.poll(() => navigateTo.mock.calls).toEqual([['/sign-in', { external: true }]])
    expect(deletes).toBe(1)
  })

  it('says that the person is still signed in when the server did not answer', async () => {
    isServerUp = false
    const person = await press('Sign out')
    await expect.poll(() => person.text()).toContain('You are still signed in')
    expect(navigateTo).not.toHaveBeenCalled()
    expect(useSessionStore().signedIn).toEqual(MAREN)
  })
})
