import { expect, test } from '@playwright/test'
import flow from '../fixtures/published-checks/flow.json' with { type: 'json' }
import time from '../fixtures/published-checks/time.json' with { type: 'json' }
import volume from '../fixtures/published-checks/volume.json' with { type: 'json' }
import { Phone } from './support/phone'
import { noteTime, readFlow, startSheet } from './support/sheet'

/*
 * Three published worked examples, typed in through the screens as a technician would, end with the published answer.
 * Their sources stand beside the numbers in tests/fixtures/published-checks/.
 */

const caseOf = <T extends { id: string }>(cases: readonly T[], id: string): T => cases.find(one => one.id === id)!

test('flow, time and volume typed on a phone end with the published answers', async ({ baseURL }) => {
  test.setTimeout(180_000)
  const phone = await Phone.open(baseURL)
  try {
    await phone.signIn('orla')
    await phone.offline()
    const { page } = phone
    const day = new Date(Date.now() - 86_400_000)
    const at = (clock: string) => new Date(`${day.toISOString().slice(0, 10)}T${clock}:00Z`)

    // Time: 07:02 to 15:31 with a pause at lunch from 11:30 to 12:04 is 475 minutes.
    const pause = caseOf(time, 'C063')
    const timed = await startSheet(page, { number: 'PA-1', worker: 'D-119', task: 'Charging', pump: 'BR-0411' })
    const { start, stop, pauses } = pause.inputs as { start: string, stop: string, pauses: [string, string][] }
    await noteTime(page, timed, 'Start', at(start))
    await noteTime(page, timed, 'Pause', at(pauses[0]![0]), 'lunch')
    await noteTime(page, timed, 'Resume', at(pauses[0]![1]))
    await noteTime(page, timed, 'Stop', at(stop))
    await expect(page.getByText(`${(pause.expected as { minutes: number }).minutes} min`, { exact: true }).first()).toBeVisible()

    // Flow: 2.01, 2.00, 1.99 before and 1.95, 1.94, 1.93 after: means 2.00 and 1.94, change -3.0 %, within.
    const agreement = caseOf(flow, 'C059')
    const { pre, post } = agreement.inputs as { pre: number[], post: number[] }
    const sheetId = await startSheet(page, { number: 'PA-2', worker: 'D-120', task: 'Ladle preparation', pump: 'BR-0412' })
    const typed = (value: number) => value.toFixed(2)
    await readFlow(page, sheetId, 'before', pre.map(typed))
    const result = page.getByRole('group', { name: 'Result so far' })
    await expect(result).toContainText('2.000 L/min')

    // Volume: 1.97 L/min over 450 minutes is 886.5 L.
    const sampled = caseOf(volume, 'C066')
    const { minutes } = sampled.inputs as { minutes: number }
    const started = new Date(Date.now() - (minutes + 5) * 60_000)
    started.setUTCSeconds(0, 0)
    await noteTime(page, sheetId, 'Start', started)
    await noteTime(page, sheetId, 'Stop', new Date(started.getTime() + minutes * 60_000))
    await readFlow(page, sheetId, 'after', post.map(typed))
    await expect(result).toContainText('1.940 L/min')
    await expect(result).toContainText('−3.0 %')
    await expect(result).toContainText('within')
    await page.goto(`/field/sheets/${sheetId}`)
    await expect(page.getByText((sampled.expected as { V_L: number }).V_L.toFixed(1), { exact: true }).first()).toBeVisible()
  }
  finally {
    await phone.close(test.info().outputPath('last.png'))
  }
})
