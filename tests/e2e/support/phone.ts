import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { chromium, expect, type BrowserContext, type Locator, type Page } from '@playwright/test'
import signIns from '../../../drizzle/seeds/demo-sign-ins.json' with { type: 'json' }

type Who = 'orla' | 'tomas' | 'ines' | 'maren' | 'piet'

export function signInOf(who: Who) {
  return signIns.find(person => person.email.startsWith(`${who}@`))!
}

/** A phone: a browser with a profile on disk, so that a kill of the browser is a kill of the phone's app. */
export class Phone {
  context!: BrowserContext
  page!: Page

  private constructor(readonly profile: string, private readonly baseURL: string | undefined, private readonly locale: string) {}

  /** @param locale the phone's language, which decides whether its pads write a point or a comma */
  static async open(baseURL: string | undefined, locale = 'en-IE'): Promise<Phone> {
    const phone = new Phone(mkdtempSync(join(tmpdir(), 'lapel-phone-')), baseURL, locale)
    await phone.start()
    return phone
  }

  async start(): Promise<void> {
    this.context = await chromium.launchPersistentContext(this.profile, {
      executablePath: process.env.CHROMIUM ?? '/usr/bin/chromium',
      args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'],
      viewport: { width: 390, height: 844 }, baseURL: this.baseURL, timezoneId: 'Europe/Dublin', locale: this.locale,
    })
    this.context.setDefaultTimeout(10_000)
    this.page = this.context.pages()[0] ?? await this.context.newPage()
  }

  async signIn(who: Who): Promise<void> {
    const { email, password } = signInOf(who)
    await this.page.goto('/sign-in')
    await this.page.getByLabel('E-mail address').fill(email)
    await this.page.getByLabel('Password').fill(password)
    await this.page.getByRole('button', { name: 'Sign in' }).click()
    await this.page.waitForURL(/\/field$/)
    await expect(this.page.getByRole('button', { name: 'Start a sheet', exact: true })).toBeVisible({ timeout: 30_000 })
    await expect(this.page.getByText('All sent')).toBeVisible()
    await this.page.evaluate(async () => { await navigator.serviceWorker.ready })
  }

  offline(isOffline = true): Promise<void> {
    return this.context.setOffline(isOffline)
  }

  /** Ends every process of the browser at once, as a dead battery would, and starts it again with the same profile. */
  async kill(options: { offline: boolean }): Promise<void> {
    for (const pid of processesOf(this.profile)) {
      try { process.kill(pid, 'SIGKILL') }
      catch { /* it ended meanwhile */ }
    }
    await this.context.close().catch(() => {})
    for (const name of ['SingletonLock', 'SingletonCookie', 'SingletonSocket']) rmSync(join(this.profile, name), { force: true })
    await this.start()
    if (options.offline) await this.offline()
  }

  /** @param picture where to keep a picture of the last screen, for a test that fails */
  async close(picture?: string): Promise<void> {
    if (picture) await this.page.screenshot({ path: picture }).catch(() => {})
    await this.context.close().catch(() => {})
    rmSync(this.profile, { recursive: true, force: true })
  }
}

/** Chooses in a picker by the words of an option. */
export async function choose(page: Page, label: string, option: string | RegExp, more: { search?: string, done?: boolean } = {}): Promise<void> {
  await page.locator('button[aria-haspopup="dialog"]').and(page.getByRole('button', { name: new RegExp(`^${label} `) })).click()
  const dialog = page.getByRole('dialog', { name: label })
  if (more.search) await dialog.getByLabel('Search').fill(more.search)
  await dialog.getByRole('button', { name: option }).first().click()
  if (more.done) await dialog.getByRole('button', { name: 'Done' }).click()
  await expect(dialog).toBeHidden()
}

/** Fills a field that saves by itself, and waits until the phone has kept it. */
export async function fill(page: Page, label: string, text: string): Promise<void> {
  const field = page.getByLabel(label, { exact: true })
  await field.fill(text)
  await field.blur()
}

/** Opens a folded part of a page. */
export async function unfold(scope: Page | Locator, title: string): Promise<void> {
  const page = 'page' in scope ? scope.page() : scope
  const fold = scope.locator('details', { has: page.locator('summary', { hasText: title }) }).first()
  if (await fold.getAttribute('open') === null) await fold.locator('summary').first().click()
}

/** Types a flow on the pad's own keys and keeps it. */
export async function keepReading(page: Page, digits: string, number: number): Promise<void> {
  const keys = page.getByRole('group', { name: 'Keys for the reading' })
  for (const digit of digits) await keys.getByRole('button', { name: digit === ',' || digit === '.' ? /^[.,]$|point|comma/i : digit, exact: digit !== ',' && digit !== '.' }).click()
  // A machine types faster than the button lets a second tap through; a person never does.
  await expect(async () => {
    await page.getByRole('button', { name: `Keep reading ${number}` }).click({ timeout: 1000 })
    await expect(page.getByRole('button', { name: new RegExp(`^Correct reading ${number}\\b`) })).toBeVisible({ timeout: 1000 })
  }).toPass({ timeout: 20_000 })
}

function processesOf(profile: string): number[] {
  return readdirSync('/proc').filter(name => /^\d+$/.test(name)).filter((pid) => {
    try { return readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes(profile) }
    catch { return false }
  }).map(Number)
}
