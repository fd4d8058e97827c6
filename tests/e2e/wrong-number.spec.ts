import { expect, test } from '@playwright/test'
import { readStore } from './support/field-store'
import { Phone, keepReading, unfold } from './support/phone'
import { readFlow, startSheet } from './support/sheet'

/*
 * A number typed wrong: what is no number is not taken and stays to be mended, what is unusual is said at once and can be kept,
 * and what was kept wrong is corrected with a reason while the first value stays.
 */

test('a wrong number is caught while it is typed, and corrected with a reason when it was kept', async ({ baseURL }) => {
  test.setTimeout(120_000)
  const phone = await Phone.open(baseURL)
  const { page } = phone
  try {
    await phone.signIn('orla')
    await phone.offline()
    const sheetId = await startSheet(page, { number: 'WN-1', worker: 'D-119', task: 'Ladle preparation', pump: 'BR-0412' })
    await readFlow(page, sheetId, 'before', ['2.00'])
    const readings = async () => (await readStore<{ op: { body: { type?: string } } }>(page, 'outbox')).filter(entry => entry.op.body.type === 'flow-reading').length
    expect(await readings()).toBe(1)

    const field = page.getByRole('textbox', { name: /^Reading 2/ })
    const keep = page.getByRole('button', { name: 'Keep reading 2' })
    for (const text of ['2.0.1', '1.234,5', '-2.0', 'two', '2 0 0', '1e3', '٢', '∞', '0']) {
      await field.fill(text)
      await expect(page.getByRole('alert').or(page.locator('.text-madder')).first(), `"${text}" is complained of`).toBeVisible()
      await keep.click()
      await page.waitForTimeout(450)
      await expect(field, `"${text}" stays to be mended`).toHaveValue(text)
    }
    expect(await readings()).toBe(1)

    // A slip of the point: far outside what this pump can draw. It is said, and it is the technician's to keep.
    await field.fill('20.1')
    await expect(page.getByText(/Outside the pump’s range/)).toBeVisible()
    await expect(page.getByText(/This reading is more than .* % from the mean/)).toBeVisible()
    await field.fill('')
    await keepReading(page, '20.1', 2)
    expect(await readings()).toBe(2)
    await expect(page.getByRole('group', { name: 'Result so far' })).toContainText('11.05')

    await page.getByRole('button', { name: 'Correct reading 2' }).click()
    const dialog = page.getByRole('dialog', { name: 'Correct' })
    await dialog.getByRole('textbox', { name: 'Flow', exact: true }).fill('2.01')
    await dialog.getByRole('button', { name: 'Typed wrong' }).click()
    await dialog.getByRole('button', { name: 'Correct it' }).click()
    await expect(dialog).toBeHidden()
    await expect(page.getByRole('group', { name: 'Result so far' })).toContainText('2.005 L/min')

    await page.goto(`/field/sheets/${sheetId}#flow-before`)
    const part = page.getByRole('region', { name: 'Flow before' })
    await unfold(part, 'Readings')
    await expect(part.locator('s').filter({ hasText: '20.1' })).toBeVisible()
    await expect(part.getByText('Corrected: Typed wrong')).toBeVisible()
  }
  finally {
    await phone.close(test.info().outputPath('last.png'))
  }
})
