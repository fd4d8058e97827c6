import type { Browser, Page } from '@playwright/test'
import { signInOf } from './phone'

/** A desk in the office: a browser of its own, signed in. */
export async function openOffice(browser: Browser, baseURL: string | undefined, who: 'maren' | 'piet' = 'maren'): Promise<Page> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 }, baseURL, timezoneId: 'Europe/Dublin' })
  const page = await context.newPage()
  const { email, password } = signInOf(who)
  await page.goto('/sign-in')
  await page.getByLabel('E-mail address').fill(email)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL(url => url.pathname.startsWith('/office'))
  return page
}
