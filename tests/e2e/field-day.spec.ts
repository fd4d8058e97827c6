import { expect, test, type Page } from '@playwright/test'
import { acknowledged, readStore, waitingOperations } from './support/field-store'
import { openOffice } from './support/office'
import { Phone, choose, fill, signInOf, unfold } from './support/phone'
import { serverOperations } from './support/server-store'
import { killServer, startServer, stopServer } from './support/server-control'
import { finishHandIn, noteTime, readFlow, startPlanned, startSheet } from './support/sheet'

/*
 * The job itself: a shift sampled on a phone with the server dead, the browser killed in the middle, the server killed while the
 * phone sends, the office accepting one sheet and returning one, and the correction. Nothing may be lost, doubled or changed.
 */

/** A task as a worker may say it: quotes, a less-than, mark-up, accents, emoji, and 200 characters in all. */
const ODD_START = 'He said "don\'t stop", <LOD> on the <b>booth</b> & 50 % café – 焊接 🧑🏽‍🏭🔥 '
const ODD_TASK = ODD_START + 'weld '.repeat(60).slice(0, 200 - ODD_START.length - 1) + '.'

const minutesAgo = (minutes: number) => new Date(Math.floor(Date.now() / 60_000) * 60_000 - minutes * 60_000)

test.afterEach(startServer)

test('a whole day offline, from the plan line to the accepted sheet, through a killed browser and a killed server', async ({ baseURL, browser }) => {
  test.setTimeout(300_000)
  expect(ODD_TASK).toHaveLength(200)
  const notedAt = minutesAgo(425)
  const meantAt = minutesAgo(420)
  const phone = await Phone.open(baseURL, 'de-DE')
  try {
    await phone.signIn('tomas')
    await phone.offline()
    await stopServer()

    // The first sheet comes from a plan line. Its pages were never opened on this phone, and the server is dead.
    const sheetId = await startPlanned(phone.page, 'D-114')
    await unfold(phone.page, 'Who and when')
    await fill(phone.page, 'Task', ODD_TASK)
    await unfold(phone.page, 'What')
    await fill(phone.page, 'Sample number', 'DAY-1')
    await choose(phone.page, 'Sampler', /37-mm closed-face cassette/, { search: '37-mm' })
    await fill(phone.page, 'Medium', 'MCE 0.8 µm')
    await unfold(phone.page, 'Pump and train')
    await choose(phone.page, 'Pump', /BR-0411/)
    await choose(phone.page, 'Calibrator', /PD-19/)
    await readFlow(phone.page, sheetId, 'before', ['2,01', '2,00', '1,99'])
    await expect(phone.page.getByRole('group', { name: 'Result so far' })).toContainText('2.000 L/min')

    await noteTime(phone.page, sheetId, 'Start', notedAt)
    await noteActivity(phone.page, sheetId, ODD_TASK, { worker: true })
    await flowCheck(phone.page, sheetId, { flow: '1,98', minutes: '425' })

    // Pause, and a note half typed when the battery goes.
    await phone.page.goto(`/field/sheets/${sheetId}`)
    await phone.page.getByRole('button', { name: 'Pause', exact: true }).click()
    await phone.page.getByRole('dialog', { name: 'Why is it paused' }).getByRole('button', { name: 'Lunch', exact: true }).click()
    await expect(phone.page.getByRole('button', { name: 'Resume', exact: true })).toBeVisible()
    await openTool(phone.page, 'Note')
    await phone.page.getByRole('dialog', { name: 'Note' }).getByRole('textbox', { name: 'Note' }).fill(`Curtain open. ${ODD_TASK}`)
    await expect.poll(async () => (await readStore<{ text: string }>(phone.page, 'drafts')).some(draft => draft.text.startsWith('Curtain open.'))).toBe(true)
    const beforeKill = await waitingOperations(phone.page)
    await phone.kill({ offline: true })

    await phone.page.goto(`/field/sheets/${sheetId}`)
    expect(await waitingOperations(phone.page)).toEqual(beforeKill)
    await expect(phone.page.getByText(/^Paused .* since/)).toBeVisible()
    await openTool(phone.page, 'Note')
    const note = phone.page.getByRole('dialog', { name: 'Note' })
    await expect(note.getByRole('textbox', { name: 'Note' })).toHaveValue(`Curtain open. ${ODD_TASK}`)
    await note.getByRole('button', { name: 'Save the note' }).click()
    await expect(note).toBeHidden()
    await phone.page.getByRole('button', { name: 'Resume', exact: true }).click()
    await expect(phone.page.getByRole('button', { name: 'Pause', exact: true })).toBeVisible()

    // A time that was noted wrong: corrected with a reason, the first value stays in sight.
    await unfold(phone.page, 'Everything that happened')
    await phone.page.getByRole('button', { name: /^Correct Start/ }).click()
    const correct = phone.page.getByRole('dialog', { name: 'Correct' })
    await correct.getByRole('checkbox', { name: 'The time was another one' }).check()
    await correct.locator('input[type=time]').fill(clock(meantAt))
    await correct.getByRole('button', { name: 'Correct it' }).click()
    await expect(correct.getByText('Give the reason. It stays beside the first value.')).toBeVisible()
    await correct.getByRole('button', { name: 'Pressed late' }).click()
    await expect(async () => {
      // The button lets no second tap through for a moment.
      await correct.getByRole('button', { name: 'Correct it' }).click({ timeout: 1000 })
      await expect(correct).toBeHidden({ timeout: 1000 })
    }).toPass({ timeout: 20_000 })
    await expect(phone.page.getByText('Corrected: Pressed late')).toBeVisible()
    await expect(phone.page.locator('#air s').filter({ hasText: clock(notedAt) })).toBeVisible()

    await phone.page.getByRole('button', { name: 'Stop', exact: true }).click()
    await expect(phone.page.getByRole('link', { name: 'Flow after', exact: true })).toBeVisible()
    await readFlow(phone.page, sheetId, 'after', ['1,96', '1,95', '1,94'])
    await phone.page.goto(`/field/sheets/${sheetId}`)
    await answerFindings(phone.page)
    await finishHandIn(phone.page, sheetId, { isFit: true })
    await expect(phone.page.getByText('Handed in, waiting to send')).toBeVisible()

    // The second sheet comes from nothing and is not fit.
    const secondId = await startSheet(phone.page, { number: 'DAY-2', worker: 'D-119', task: ODD_TASK, pump: 'BR-0412' })
    await readFlow(phone.page, secondId, 'before', ['2,00', '2,00', '2,00'])
    await noteTime(phone.page, secondId, 'Start', minutesAgo(300))
    await noteTime(phone.page, secondId, 'Stop', minutesAgo(30))
    await finishHandIn(phone.page, secondId, { isFit: false, reason: 'Tube came off <for a while>' })

    await phone.page.goto('/field/waiting')
    const written = await waitingOperations(phone.page)
    expect(written.length).toBeGreaterThan(30)
    await expect(phone.page.getByRole('heading', { name: `On this phone, not sent yet ${written.length}` })).toBeVisible()

    // A browser that is killed may lose its newest cookies; here the session is gone for certain, and the queue waits for a sign-in.
    await phone.context.clearCookies()
    await startServer()
    await phone.offline(false)
    await phone.page.getByRole('link', { name: 'Sign in', exact: true }).click({ timeout: 30_000 })
    expect(await waitingOperations(phone.page)).toEqual(written)
    await phone.page.getByLabel('E-mail address').fill(signInOf('tomas').email)
    await phone.page.getByLabel('Password').fill(signInOf('tomas').password)

    // The server is killed as soon as the phone sends: what it took without saying so must not come twice.
    const sending = phone.page.waitForRequest(/\/api\/sync\/push$/)
    await phone.page.getByRole('button', { name: 'Sign in' }).click()
    await sending
    await killServer()
    await startServer()
    await phone.page.goto('/field/waiting')
    await expect(async () => {
      await phone.page.getByRole('button', { name: 'Try now' }).click({ timeout: 1000 }).catch(() => {})
      expect(await waitingOperations(phone.page)).toHaveLength(0)
    }).toPass({ timeout: 60_000 })
    await expect(phone.page.getByText('Everything is sent')).toBeVisible()
    const answers = await acknowledged(phone.page)
    expect(answers.map(one => one.id).sort()).toEqual([...written].sort())
    expect(answers.filter(one => one.outcome !== 'ok' && one.outcome !== 'dup')).toEqual([])
    expect((await serverOperations(written)).sort()).toEqual([...written].sort())

    // The office sees both, with the words as they were said; it accepts one and returns the other.
    const office = await openOffice(browser, baseURL)
    await office.goto(`/office/review/${sheetId}`)
    await expect(office.getByRole('heading', { name: 'Sample DAY-1' })).toBeVisible()
    await expect(office.getByText(ODD_TASK).first()).toBeVisible()
    await expect(office.getByText('2,01').first()).toBeVisible()
    await expect(office.getByText(/−2\.5/).first()).toBeVisible()
    await decide(office, 'Accept')
    await office.goto(`/office/review/${secondId}`)
    await expect(office.getByText('Tube came off <for a while>').first()).toBeVisible()
    await decide(office, 'Return', 'Which tube, and for how long?')

    // Without being asked, the phone shows both.
    await phone.page.goto(`/field/sheets/${sheetId}`)
    await expect(phone.page.getByText(/Accepted$/).first()).toBeVisible({ timeout: 60_000 })
    await phone.page.goto(`/field/sheets/${secondId}`)
    await expect(phone.page.getByText('Which tube, and for how long?')).toBeVisible({ timeout: 60_000 })
    await phone.offline()
    await openTool(phone.page, 'Note')
    await note.getByRole('textbox', { name: 'Note' }).fill('The inlet tube, 10 minutes at the most')
    await note.getByRole('button', { name: 'Save the note' }).click()
    await expect(note).toBeHidden()
    await finishHandIn(phone.page, secondId, { isFit: false, reason: 'The inlet tube was off for ten minutes' })
    await phone.offline(false)
    await office.goto(`/office/review/${secondId}`)
    await expect(office.getByText('The inlet tube was off for ten minutes').first()).toBeVisible({ timeout: 60_000 })
    await expect(office.getByText('The inlet tube, 10 minutes at the most').first()).toBeVisible()
    await decide(office, 'Accept', 'Usable as a lower bound')
    await office.context().close()
  }
  finally {
    await phone.close(test.info().outputPath('last.png'))
  }
})

const clock = (at: Date) => new Intl.DateTimeFormat('sv-SE', { timeZone: 'Europe/Dublin', timeStyle: 'short' }).format(at)

async function openTool(page: Page, name: string) {
  await page.getByRole('group', { name: 'Note something' }).getByRole('button', { name, exact: true }).click()
}

async function noteActivity(page: Page, sheetId: string, text: string, { worker }: { worker: boolean }) {
  await page.goto(`/field/sheets/${sheetId}/activity`)
  if (worker) await page.getByRole('radio', { name: /^As .* says$/ }).check()
  await page.getByLabel('What is done').fill(text)
  await page.getByRole('button', { name: 'Save', exact: true }).click()
  await expect(page.getByRole('region', { name: 'Noted so far' }).getByText(text)).toBeVisible()
}

async function flowCheck(page: Page, sheetId: string, { flow, minutes }: { flow: string, minutes: string }) {
  await page.goto(`/field/sheets/${sheetId}/check`)
  await page.getByRole('textbox', { name: /^Flow now/ }).fill(flow)
  const own = page.getByRole('textbox', { name: /^Pump’s minutes/ })
  if (await own.isVisible()) await own.fill(minutes)
  await page.getByRole('button', { name: 'Save the check' }).click()
  await page.waitForURL(new RegExp(`/field/sheets/${sheetId}(#.*)?$`))
}

/** Gives every finding that asks for one a reason. */
async function answerFindings(page: Page) {
  const open = page.getByRole('button', { name: 'Save the answer' })
  await expect(page.getByRole('heading', { name: 'Findings' })).toBeVisible()
  for (let left = await open.count(); left > 0; left--) {
    await page.getByRole('textbox', { name: /^(Reason|What happened)/ }).first().fill('Seen and noted on the day')
    await open.first().click()
    await expect(open).toHaveCount(left - 1)
  }
}

async function decide(office: Page, step: 'Accept' | 'Return', reason?: string) {
  const form = office.getByRole('complementary', { name: 'Decision' })
  await form.getByRole('button', { name: step, exact: true }).click()
  if (reason) await form.getByRole('textbox', { name: /^Reason/ }).fill(reason)
  await form.getByRole('button', { name: `${step} this sheet` }).click()
  await expect(office.getByText(step === 'Accept' ? /Accepted\.$/ : /Returned\.$/)).toBeVisible()
}
