import { expect, test } from '@playwright/test'
import { waitingOperations } from './support/field-store'
import { openOffice } from './support/office'
import { Phone, fill, unfold } from './support/phone'
import { startSheet } from './support/sheet'

/*
 * Two technicians on one survey set the same field while neither has a network. Nobody's words may go in silence: phone and
 * office show both values, with who and when, until a person chooses.
 */

test('two phones set one field: both values stand on the phones and in the office until one is chosen', async ({ baseURL, browser }) => {
  test.setTimeout(180_000)
  const orla = await Phone.open(baseURL)
  const ines = await Phone.open(baseURL)
  try {
    await orla.signIn('orla')
    await ines.signIn('ines')
    const sheetId = await startSheet(orla.page, { number: 'TWO-1', worker: 'D-119', task: 'Ladle preparation', pump: 'BR-0412' })
    await expect.poll(() => waitingOperations(orla.page), { timeout: 20_000 }).toHaveLength(0)
    await ines.page.goto(`/field/sheets/${sheetId}`)
    await expect(ines.page.getByRole('heading', { level: 1, name: /TWO-1/ })).toBeVisible({ timeout: 20_000 })

    await orla.offline()
    await ines.offline()
    for (const [phone, task] of [[orla, 'Ladle preparation, north bay'], [ines, 'Relining "the old one" <2 h']] as const) {
      await phone.page.goto(`/field/sheets/${sheetId}`)
      await unfold(phone.page, 'Who and when')
      await fill(phone.page, 'Task', task)
      await expect.poll(() => waitingOperations(phone.page)).toHaveLength(1)
    }

    // One after the other: the second one finds a value there that its phone had never shown.
    await orla.offline(false)
    await expect.poll(() => waitingOperations(orla.page), { timeout: 30_000 }).toHaveLength(0)
    await ines.offline(false)
    await expect.poll(() => waitingOperations(ines.page), { timeout: 30_000 }).toHaveLength(0)

    for (const phone of [orla, ines]) {
      const both = phone.page.getByRole('region', { name: 'Two values for Task' })
      await expect(both.getByText('Ladle preparation, north bay')).toBeVisible({ timeout: 30_000 })
      await expect(both.getByText('Relining "the old one" <2 h')).toBeVisible()
      await expect(both.getByText('Orla', { exact: false })).toBeVisible()
      await expect(both.getByText('Ines', { exact: false })).toBeVisible()
    }
    const office = await openOffice(browser, baseURL)
    await office.goto(`/office/review/${sheetId}`)
    await expect(office.getByRole('heading', { name: /Task: two phones wrote different values/ })).toBeVisible()
    await expect(office.getByText('Ladle preparation, north bay').first()).toBeVisible()
    await expect(office.getByText('Relining "the old one" <2 h').first()).toBeVisible()

    await orla.page.getByRole('region', { name: 'Two values for Task' }).getByRole('button', { name: /north bay/ }).click()
    await expect(orla.page.getByRole('region', { name: 'Two values for Task' })).toBeHidden()
    await expect(ines.page.getByRole('region', { name: 'Two values for Task' })).toBeHidden({ timeout: 30_000 })
    await expect(ines.page.getByLabel('Task', { exact: true })).toHaveValue('Ladle preparation, north bay')
    await office.reload()
    await expect(office.getByText('1 conflict already settled')).toBeVisible()
    await office.getByText('1 conflict already settled').click()
    await expect(office.getByText('Relining "the old one" <2 h').first()).toBeVisible()
    await office.context().close()
  }
  finally {
    await orla.close(test.info().outputPath('orla.png'))
    await ines.close(test.info().outputPath('ines.png'))
  }
})
