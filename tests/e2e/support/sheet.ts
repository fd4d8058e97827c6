import { expect, type Page } from '@playwright/test'
import { choose, fill, keepReading, unfold } from './phone'

/** Starts a personal, pumped sample from nothing and fills in who, what and with which train. */
export async function startSheet(page: Page, input: { number: string, worker: string, task: string, pump: string, survey?: RegExp }): Promise<string> {
  await page.goto('/field')
  await page.getByRole('button', { name: 'Start a sheet', exact: true }).click()
  const dialog = page.getByRole('dialog', { name: 'Start a sheet' })
  await dialog.getByRole('radio', { name: input.survey ?? /Fettling shop/ }).check()
  await dialog.getByRole('button', { name: 'Start the sheet' }).click()
  await page.waitForURL(/\/field\/sheets\/[0-9a-f-]+/)
  await unfold(page, 'Who and when')
  await choose(page, 'Worker', new RegExp(input.worker))
  await fill(page, 'Task', input.task)
  await unfold(page, 'What')
  await fill(page, 'Sample number', input.number)
  await choose(page, 'Agents', /^Lead, inorganic/, { search: 'lead', done: true })
  await choose(page, 'Sampler', /37-mm closed-face cassette/, { search: '37-mm' })
  await unfold(page, 'Pump and train')
  await choose(page, 'Pump', new RegExp(input.pump))
  await choose(page, 'Calibrator', /PD-19/)
  return new URL(page.url()).pathname.split('/')[3]!
}

/** Three or more readings on the pad, typed on its own keys. */
export async function readFlow(page: Page, sheetId: string, when: 'before' | 'after', readings: string[]): Promise<void> {
  await page.goto(`/field/sheets/${sheetId}/flow?when=${when}`)
  await expect(page.getByRole('group', { name: 'Keys for the reading' })).toBeVisible()
  const inLine = page.getByRole('group', { name: /Is the sampler in line/ })
  if (await inLine.isVisible()) {
    // The sheet's own sampler is taken; the question folds into a sentence.
    await inLine.getByRole('radio', { name: 'Yes' }).click()
  }
  for (const [index, digits] of readings.entries()) await keepReading(page, digits, index + 1)
}

const STEPS = { Start: 'It started', Pause: 'It was paused', Resume: 'It went on', Stop: 'It stopped' } as const

/** Notes a step of the run at the time it happened. */
export async function noteTime(page: Page, sheetId: string, action: 'Start' | 'Pause' | 'Resume' | 'Stop', at: Date, reason?: string): Promise<void> {
  await page.goto(`/field/sheets/${sheetId}`)
  await page.getByRole('button', { name: /^(It started earlier|Other time)$/ }).first().click()
  const dialog = page.getByRole('dialog', { name: 'It happened at another time' })
  await dialog.getByRole('radio', { name: STEPS[action] }).check()
  const local = new Intl.DateTimeFormat('sv-SE', { timeZone: 'Europe/Dublin', dateStyle: 'short', timeStyle: 'short' }).format(at)
  await dialog.getByLabel('Day').fill(local.slice(0, 10))
  await dialog.getByRole('textbox', { name: 'At', exact: true }).fill(local.slice(11, 16))
  if (reason) await dialog.getByLabel(/Reason of the pause|Note on it/).fill(reason)
  await dialog.getByRole('button', { name: 'Note it' }).click()
  await expect(dialog).toBeHidden()
}

/** Starts the sheet of a plan line. */
export async function startPlanned(page: Page, worker: string): Promise<string> {
  await page.goto('/field')
  const planned = page.getByRole('region', { name: /^Planned for today/ })
  await planned.getByRole('listitem').filter({ hasText: worker }).getByRole('button', { name: /^Start/ }).click()
  await page.waitForURL(/\/field\/sheets\/[0-9a-f-]+/)
  return new URL(page.url()).pathname.split('/')[3]!
}

/** Hands in, as fit or as not fit with the reason. */
export async function finishHandIn(page: Page, sheetId: string, answer: { isFit: true } | { isFit: false, reason: string }): Promise<void> {
  await page.goto(`/field/sheets/${sheetId}`)
  await page.getByRole('button', { name: /^Hand in/ }).first().click()
  const dialog = page.getByRole('dialog', { name: /^Hand in/ })
  if (answer.isFit) {
    await dialog.getByRole('radio', { name: /^Fit to use/ }).check()
  }
  else {
    await dialog.getByRole('radio', { name: /^Not fit/ }).check()
    await dialog.getByRole('textbox', { name: /^Why it is not fit/ }).fill(answer.reason)
  }
  await dialog.getByRole('button', { name: answer.isFit ? 'Hand in as fit' : 'Hand in as not fit' }).click()
  await expect(dialog).toBeHidden()
}
