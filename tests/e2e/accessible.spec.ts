import { expect, test, type Page } from '@playwright/test'
import { expectAccessible } from './support/axe'
import { Phone, signInOf, unfold } from './support/phone'
import { noteTime, startSheet } from './support/sheet'
import { watchPage, type PageWatch } from './support/page-watch'

/*
 * Every page in both themes: nothing that axe finds, text of 7:1 on the phone, no control of the field under 64 px, nothing
 * fetched from elsewhere and nothing that the content security policy had to stop.
 */

const THEMES = ['day', 'sun'] as const
const FIELD_TARGET_PIXELS = 64

interface Scene { name: string, path: string, open?: (page: Page) => Promise<void>, leave?: (page: Page) => Promise<void> }

const press = (name: string | RegExp) => async (page: Page) => {
  await page.getByRole('button', { name, exact: typeof name === 'string' }).first().click()
  await expect(page.getByRole('dialog')).toBeVisible()
}

function fieldScenes(sheetId: string): Scene[] {
  const sheet = `/field/sheets/${sheetId}`
  return [
    { name: 'Today', path: '/field' },
    { name: 'Start a sheet', path: '/field', open: press('Start a sheet') },
    { name: 'Waiting to send', path: '/field/waiting' },
    { name: 'This phone', path: '/field/phone' },
    { name: 'sheet, running', path: sheet, open: page => unfold(page, 'Everything that happened') },
    { name: 'set-up', path: sheet, open: async (page) => {
      for (const title of ['Who and when', 'What', 'Pump and train']) await unfold(page, title)
    } },
    { name: 'picker', path: sheet, open: async (page) => {
      await unfold(page, 'Pump and train')
      await page.getByRole('button', { name: /^Pump / }).first().click()
      await expect(page.getByRole('dialog', { name: 'Pump' })).toBeVisible()
    } },
    { name: 'flow before', path: `${sheet}/flow?when=before` },
    { name: 'flow after', path: `${sheet}/flow?when=after` },
    { name: 'check', path: `${sheet}/check` },
    { name: 'activity', path: `${sheet}/activity` },
    ...['Note', 'Conditions', 'Pump fault', 'Swap pump', 'Flow set anew', 'Change medium', 'Other time', 'Hand in as not fit'].map(name => ({ name, path: sheet, open: press(name) })),
    // When Pause was pressed is kept until it is answered, through a reload too.
    { name: 'pause', path: sheet, open: press('Pause'), leave: page => page.getByRole('button', { name: 'Do not pause' }).click() },
    { name: 'correct', path: sheet, open: async (page) => {
      await unfold(page, 'Everything that happened')
      await press(/^Correct Start/)(page)
    } },
    { name: 'no such sheet', path: '/field/sheets/00000000-0000-7000-8000-000000000000' },
  ]
}

test('every page of the phone', async ({ baseURL }) => {
  test.setTimeout(300_000)
  const phone = await Phone.open(baseURL)
  const { page } = phone
  const watch = watchPage(page)
  try {
    await page.setViewportSize({ width: 360, height: 740 })
    await page.goto('/')
    await expectAccessible(page, 'door', { enhancedContrast: false })
    await page.goto('/sign-in')
    await expectAccessible(page, 'sign-in', { enhancedContrast: false })
    await phone.signIn('ines')
    const sheetId = await startSheet(page, { number: 'AX-1', worker: 'D-119', task: 'Ladle preparation', pump: 'BR-0412' })
    await noteTime(page, sheetId, 'Start', new Date(Date.now() - 30 * 60_000))
    await page.goto('/field')
    const others = await page.locator('a[href^="/field/sheets/"]').evaluateAll(links => [...new Set(links.map(link => link.getAttribute('href')!.split('#')[0]!))])
    const states = others.slice(0, 8).map((path, index) => ({ name: `sheet ${index + 1} of Today`, path }))
    for (const theme of THEMES) {
      await setTheme(page, theme)
      for (const scene of theme === 'day' ? [...fieldScenes(sheetId), ...states] : fieldScenes(sheetId)) await test.step(`${theme}: ${scene.name}`, () => lookAtField(page, scene, theme))
    }
  }
  finally {
    await phone.close(test.info().outputPath('last.png'))
  }
  expectClean(watch)
})

async function lookAtField(page: Page, scene: Scene, theme: string) {
  await page.goto(scene.path)
  await expect(page.locator('[aria-busy=true]')).toHaveCount(0)
  await scene.open?.(page)
  await expectAccessible(page, `${scene.name} (${theme})`, { enhancedContrast: true })
  expect.soft(await smallTargets(page, FIELD_TARGET_PIXELS), `${scene.name}: controls too small for a glove`).toEqual([])
  const overflow = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
  expect.soft(overflow, `${scene.name}: sideways scroll`).toBe(0)
  await scene.leave?.(page)
}

test('every page of the office', async ({ baseURL, browser }) => {
  test.setTimeout(300_000)
  const context = await browser.newContext({ baseURL, viewport: { width: 1440, height: 900 }, timezoneId: 'Europe/Dublin' })
  const page = await context.newPage()
  const watch = watchPage(page)
  const { email, password } = signInOf('maren')
  await page.goto('/sign-in')
  await page.getByLabel('E-mail address').fill(email)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL(url => url.pathname.startsWith('/office'))
  await page.goto('/office/review?state=all')
  await expect(page.getByRole('table')).toBeVisible()
  const sheets = await page.locator('a[href^="/office/review/"]').evaluateAll(links => [...new Set(links.map(link => link.getAttribute('href')!.split('?')[0]!))])
  expect(sheets.length).toBeGreaterThan(5)
  await page.goto('/office/surveys')
  const survey = await page.locator('a[href^="/office/surveys/"]').first().getAttribute('href')
  const paths = ['/office', '/office/review', '/office/review?q=nothing-like-this', '/office/surveys', survey!, '/office/phones', '/office/review/00000000-0000-7000-8000-000000000000', '/office/nowhere']
  const looks: { theme: typeof THEMES[number], width: number, paths: string[] }[] = [
    { theme: 'day', width: 1440, paths: [...paths, ...sheets.slice(0, 6)] },
    { theme: 'day', width: 390, paths: [...paths, sheets[0]!] },
    { theme: 'sun', width: 1440, paths: [...paths, sheets[0]!] },
  ]
  for (const look of looks) {
    await setTheme(page, look.theme)
    await page.setViewportSize({ width: look.width, height: 900 })
    for (const path of look.paths) await test.step(`${look.theme}, ${look.width}: ${path}`, async () => {
      await page.goto(path)
      await expect(page.locator('[aria-busy=true]')).toHaveCount(0)
      await expectAccessible(page, `${path} (${look.theme}, ${look.width})`, { enhancedContrast: false })
      const overflow = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
      expect.soft(overflow, `${path} at ${look.width}: sideways scroll`).toBe(0)
    })
  }
  await context.close()
  expectClean(watch)
})

async function setTheme(page: Page, theme: typeof THEMES[number]) {
  await page.evaluate(name => localStorage.setItem('lapel-theme', name), theme)
}

function expectClean(watch: PageWatch) {
  expect(watch.foreign, 'requests to elsewhere').toEqual([])
  expect(watch.refused, 'stopped by the content security policy').toEqual([])
  expect(watch.errors, 'errors in the page').toEqual([])
}

/** Controls in sight whose box, or whose label's box, is smaller than `least` in height or width. */
async function smallTargets(page: Page, least: number): Promise<string[]> {
  return page.evaluate((least) => {
    const scope = document.querySelector('dialog[open]') ?? document.body
    const found: string[] = []
    for (const control of scope.querySelectorAll<HTMLElement>('a[href], button, summary, input, select, textarea, [role=button], [role=radio], [tabindex="0"]')) {
      const target = control instanceof HTMLInputElement && ['radio', 'checkbox'].includes(control.type) ? control.closest('label') ?? control : control
      const box = target.getBoundingClientRect()
      const isSeen = control.checkVisibility({ visibilityProperty: true, opacityProperty: false }) && box.bottom > 0 && box.right > 0 && box.width > 1
      if (isSeen && (box.height < least - 0.5 || box.width < least - 0.5)) found.push(`${control.tagName.toLowerCase()} "${(control.getAttribute('aria-label') ?? control.textContent ?? '').trim().slice(0, 40)}" ${Math.round(box.width)}×${Math.round(box.height)}`)
    }
    return found
  }, least)
}
