import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { chromium, expect, test, type BrowserContext, type Page } from '@playwright/test'
import signIns from '../../drizzle/seeds/demo-sign-ins.json' with { type: 'json' }
import { readStore } from './support/field-store'

/*
 * What the phone promises, in a real browser with a profile on disk: a kill of the browser is a kill of the phone's app.
 */

const technician = signIns.find(person => person.role === 'technician')!
const profiles: string[] = []
const contexts: BrowserContext[] = []

async function openPhone(profile: string, baseURL: string | undefined): Promise<{ context: BrowserContext, page: Page }> {
  const context = await chromium.launchPersistentContext(profile, {
    executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium', args: ['--no-sandbox', '--disable-gpu'], viewport: { width: 390, height: 844 }, baseURL,
  })
  contexts.push(context)
  return { context, page: context.pages()[0] ?? await context.newPage() }
}

function newProfile(): string {
  const profile = mkdtempSync(join(tmpdir(), 'phone-'))
  profiles.push(profile)
  return profile
}

test.afterEach(async () => {
  for (const context of contexts.splice(0)) await context.close().catch(() => {})
  for (const profile of profiles.splice(0)) rmSync(profile, { recursive: true, force: true })
})

async function signIn(page: Page) {
  await page.goto('/sign-in')
  await page.getByLabel('E-mail address').fill(technician.email)
  await page.getByLabel('Password').fill(technician.password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL(/\/field(\/|$)/)
}

interface StoredRow { t: string, object: string, data: { type?: string, state?: string } }

async function anOpenSheet(page: Page): Promise<string> {
  await expect.poll(async () => (await readStore<{ k: string, value: { isComplete?: boolean } }>(page, 'meta')).find(entry => entry.k === 'cursor')?.value.isComplete ?? false).toBe(true)
  const rows = await readStore<StoredRow>(page, 'rows')
  const moved = new Set(rows.filter(row => row.t === 'state' && row.data.state !== 'open' && row.data.state !== 'returned').map(row => row.object))
  const sheet = rows.find(row => row.t === 'obj' && row.data.type === 'sheet' && !moved.has(row.object))
  expect(sheet, 'the demo has a sheet that is still open').toBeDefined()
  return sheet!.object
}

const waitForWorker = (page: Page) => page.evaluate(async () => { await navigator.serviceWorker.ready })

async function writeActivity(page: Page, sheetId: string, text: string) {
  await page.goto(`/field/sheets/${sheetId}/activity`)
  await page.getByLabel('What is done').fill(text)
  await page.getByRole('button', { name: 'Save', exact: true }).click()
  await expect(page.getByText(text).first()).toBeVisible()
}

test('what was saved with no network outlives a kill of the browser, opens with no network, waits for the session, and is sent once', async ({ baseURL }) => {
  const profile = newProfile()
  const first = await openPhone(profile, baseURL)
  await signIn(first.page)
  const sheetId = await anOpenSheet(first.page)
  await waitForWorker(first.page)
  await first.context.setOffline(true)
  const text = `Sanding doors ${Date.now()}`
  await writeActivity(first.page, sheetId, text)
  await expect.poll(async () => (await readStore(first.page, 'outbox')).length).toBe(1)

  await killBrowser(first.context, profile)

  const second = await openPhone(profile, baseURL)
  await second.context.setOffline(true)
  await second.page.goto(`/field/sheets/${sheetId}/activity`)
  await expect(second.page.getByText(text).first()).toBeVisible()
  const [waiting] = await readStore<{ id: string }>(second.page, 'outbox')
  // A browser that is killed may lose its newest cookies; here the session is gone for certain, and the queue must not mind.
  await second.context.clearCookies()
  await second.context.setOffline(false)
  await expect.poll(async () => (await readStore<{ k: string, value: unknown }>(second.page, 'meta')).find(entry => entry.k === 'network')?.value, { timeout: 20_000 }).toBe('signed-out')
  expect(await readStore(second.page, 'outbox')).toHaveLength(1)
  await signIn(second.page)
  await expect.poll(async () => (await readStore(second.page, 'outbox')).length, { timeout: 20_000 }).toBe(0)
  const acknowledged = await readStore<{ id: string, outcome: string }>(second.page, 'acked')
  expect(acknowledged).toMatchObject([{ id: waiting!.id, outcome: 'ok' }])
  await expect.poll(async () => (await readStore<{ t: string, id: string }>(second.page, 'rows')).filter(row => row.t === 'ev' && row.id === waiting!.id).length).toBe(1)
})

test('two tabs show each other\'s work at once, and every change is sent once', async ({ baseURL }) => {
  const { context, page } = await openPhone(newProfile(), baseURL)
  await signIn(page)
  const sheetId = await anOpenSheet(page)
  const other = await context.newPage()
  await other.goto(`/field/sheets/${sheetId}/activity`)
  await expect(other.getByLabel('What is done')).toBeVisible()
  const text = `Fettling ${Date.now()}`
  await writeActivity(page, sheetId, text)
  await expect(other.getByText(text).first()).toBeVisible()
  const back = `Sweeping ${Date.now()}`
  await other.getByLabel('What is done').fill(back)
  await other.getByRole('button', { name: 'Save', exact: true }).click()
  await expect(page.getByText(back).first()).toBeVisible()
  await expect.poll(async () => (await readStore(page, 'outbox')).length, { timeout: 20_000 }).toBe(0)
  expect((await readStore<{ outcome: string }>(page, 'acked')).map(entry => entry.outcome)).toEqual(['ok', 'ok'])
})

/** Ends the browser of this profile as a phone ends an app that it wants to be rid of: at once, with nothing said. */
async function killBrowser(context: BrowserContext, profile: string): Promise<void> {
  const { execFileSync } = await import('node:child_process')
  const own = execFileSync('ps', ['-eo', 'pid=,args=']).toString().split('\n').filter(line => line.includes(`--user-data-dir=${profile}`) && !line.includes('--type='))
  expect(own).toHaveLength(1)
  process.kill(Number(own[0]!.trim().split(/\s+/)[0]), 'SIGKILL')
  await context.close().catch(() => {})
}
