import type { CDPSession, Page } from '@playwright/test'
import { checkout } from '../../drizzle/scripts/local-folder.mjs'
import { readStore } from '../e2e/support/field-store'
import { Phone } from '../e2e/support/phone'
import { noteTime, readFlow, startSheet } from '../e2e/support/sheet'
import { kib, ms, printTable, quantile, type Line } from './figures'
import { weighScripts } from './script-bytes'

/*
 * What a technician waits for on the phone, measured in Chromium on the built app. Each figure stands beside one from the same
 * run: the same without the throttle, a bare write to IndexedDB, or an empty page.
 */

const SLOW = 4
const ROUNDS_OF_DIGITS = 24
const COMMITS = 60
const COLD_STARTS = 9
const baseURL = process.env.BASE_URL
const lines: Line[] = []

/** What the TypeScript runner writes around named functions; the page, which gets some of them, does not know it. */
const NAMES = 'globalThis.__name ??= value => value'

const phone = await Phone.open(baseURL)
try {
  await phone.context.addInitScript(NAMES)
  const fetched = await signInAndWatchScripts()
  const sheetId = await aSheetWithFlowBefore()

  await measureDigits(sheetId)
  await measureCommits(sheetId)
  await measureColdStarts()

  const weight = weighScripts(checkout, fetched)
  lines.push({ what: 'script of the field’s first visit, gzip', goal: '≤ 200 KiB', measured: kib(weight.total), beside: weight.files.slice(0, 6).map(file => `${file.name} ${kib(file.bytes)}`).join(', ') })
  console.log()
  printTable(lines)
  console.log('\nThe script by room:')
  for (const { room, bytes } of weight.rooms) console.log(`  ${kib(bytes).padStart(10)}  ${room}`)
}
finally {
  await phone.close()
}

/** Signs in and opens Today as on a first visit; the scripts that the page itself asked for, not the worker behind it. */
async function signInAndWatchScripts(): Promise<string[]> {
  await phone.signIn('orla')
  const scripts = await phone.page.evaluate(() => performance.getEntriesByType('resource').map(entry => entry.name).filter(name => /\/_nuxt\/.*\.js$/.test(name)))
  // Signing in is a page of its own that the field does not need.
  return [...new Set(scripts.map(url => new URL(url).pathname.slice(1)))].filter(path => !/\/sign-in\./.test(path))
}

async function aSheetWithFlowBefore(): Promise<string> {
  await phone.offline()
  const sheetId = await startSheet(phone.page, { number: 'BENCH-1', worker: 'D-119', task: 'Ladle preparation', pump: 'BR-0412' })
  await readFlow(phone.page, sheetId, 'before', ['2.00', '2.01', '1.99'])
  await noteTime(phone.page, sheetId, 'Start', new Date(Date.now() - 400 * 60_000))
  await noteTime(phone.page, sheetId, 'Stop', new Date(Date.now() - 5 * 60_000))
  await readFlow(phone.page, sheetId, 'after', ['1.95', '1.94'])
  return sheetId
}

/** From the tap on a key of the pad to the frame that shows mean, change and verdict with that digit. */
async function measureDigits(sheetId: string): Promise<void> {
  const figures: Record<number, number[]> = { 1: [], [SLOW]: [] }
  await phone.page.goto(`/field/sheets/${sheetId}/flow?when=after`)
  const keys = phone.page.getByRole('group', { name: 'Keys for the reading' })
  await keys.waitFor()
  await phone.page.evaluate(watchVerdict)
  for (const rate of [1, SLOW]) {
    const cdp = await throttled(phone.page, rate)
    for (let round = 0; round < ROUNDS_OF_DIGITS; round += 1) {
      for (const key of ['1', '.', String(2 + round % 7), String(1 + (round + 3) % 9)]) {
        await keys.getByRole('button', { name: key === '.' ? /^[.,]$|point|comma/i : key, exact: key !== '.' }).click()
        if (key === '.') continue
        figures[rate]!.push(await phone.page.evaluate(() => (globalThis as unknown as Watching).nextVerdict()))
      }
      for (let erase = 0; erase < 4; erase += 1) await keys.getByRole('button', { name: /erase|delete|back/i }).click()
      await phone.page.evaluate(() => (globalThis as unknown as Watching).forget())
    }
    await cdp.detach()
  }
  const slow = figures[SLOW]!
  lines.push({
    what: `digit typed to verdict shown, ${SLOW}× slower CPU, ${slow.length} digits`, goal: 'p95 ≤ 50 ms', measured: `p50 ${ms(quantile(slow, 0.5))}, p95 ${ms(quantile(slow, 0.95))}`,
    beside: `without the throttle p50 ${ms(quantile(figures[1]!, 0.5))}, p95 ${ms(quantile(figures[1]!, 0.95))}; ratio ${(quantile(slow, 0.95) / quantile(figures[1]!, 0.95)).toFixed(1)}`,
  })
}

interface Watching { nextVerdict: () => Promise<number>, forget: () => void }

/** In the page: notes when a key went down, and the first frame after the result changed because of it. */
function watchVerdict() {
  let downAt: number | null = null
  let shown: number | null = null
  let told: ((milliseconds: number) => void) | null = null
  document.querySelector('[aria-label="Keys for the reading"]')!.addEventListener('click', (event) => {
    downAt = event.timeStamp
    shown = null
  }, true)
  new MutationObserver(() => {
    const since = downAt
    if (since === null) return
    downAt = null
    requestAnimationFrame(() => {
      // A message is handled after the frame was drawn.
      const { port1, port2 } = new MessageChannel()
      port1.onmessage = () => {
        shown = performance.now() - since
        told?.(shown)
        told = null
        port1.close()
      }
      port2.postMessage(null)
    })
  }).observe(document.querySelector('[aria-label="Result so far"]')!, { subtree: true, childList: true, characterData: true })
  Object.assign(globalThis, {
    nextVerdict: () => new Promise<number>((resolve, reject) => {
      if (shown !== null) return resolve(shown)
      told = resolve
      setTimeout(() => reject(new Error('No verdict within 5 s.')), 5000)
    }),
    forget: () => { downAt = shown = told = null },
  })
}

/** From the tap on Keep to the frame after the words "saved on this phone", which come after the transaction is complete. */
async function measureCommits(sheetId: string): Promise<void> {
  await phone.page.goto(`/field/sheets/${sheetId}/flow?when=after`)
  const field = phone.page.getByRole('textbox', { name: /^Reading \d+/ })
  await field.waitFor()
  await phone.page.evaluate(watchSaved)
  const figures: Record<number, number[]> = { 1: [], [SLOW]: [] }
  const before = (await readStore(phone.page, 'outbox')).length
  for (const rate of [1, SLOW]) {
    const cdp = await throttled(phone.page, rate)
    for (let count = 0; count < COMMITS / 2; count += 1) {
      await field.fill(`1.9${(count + rate) % 10}`)
      await phone.page.waitForTimeout(450)
      await phone.page.getByRole('button', { name: /^Keep reading/ }).click()
      figures[rate]!.push(await phone.page.evaluate(() => (globalThis as unknown as { nextSaved: () => Promise<number> }).nextSaved()))
    }
    await cdp.detach()
  }
  const kept = (await readStore(phone.page, 'outbox')).length - before
  if (kept !== COMMITS) throw new Error(`${COMMITS} readings were said to be saved, and ${kept} are.`)
  const bare = await phone.page.evaluate(bareWrites, COMMITS)
  const p95 = quantile(figures[1]!, 0.95)
  lines.push({
    what: `tap on Keep to “saved on this phone”, ${COMMITS / 2} readings`, goal: 'p95 ≤ 30 ms', measured: `p50 ${ms(quantile(figures[1]!, 0.5))}, p95 ${ms(p95)}`,
    beside: `a bare strict write p50 ${ms(quantile(bare, 0.5))}, p95 ${ms(quantile(bare, 0.95))}, ratio ${(p95 / quantile(bare, 0.95)).toFixed(1)}; at ${SLOW}× p95 ${ms(quantile(figures[SLOW]!, 0.95))}`,
  })
}

function watchSaved() {
  let downAt = 0
  let told: ((milliseconds: number) => void) | null = null
  let shown: number | null = null
  document.addEventListener('click', (event) => {
    downAt = event.timeStamp
    shown = null
  }, true)
  new MutationObserver(() => {
    const since = downAt
    requestAnimationFrame(() => {
      const { port1, port2 } = new MessageChannel()
      port1.onmessage = () => {
        shown = performance.now() - since
        told?.(shown)
        told = null
        port1.close()
      }
      port2.postMessage(null)
    })
  }).observe(document.querySelector('p[role=status]')!, { subtree: true, childList: true, characterData: true })
  Object.assign(globalThis, {
    nextSaved: () => new Promise<number>((resolve, reject) => {
      if (shown !== null) return resolve(shown)
      told = resolve
      setTimeout(() => reject(new Error('Not saved within 5 s.')), 5000)
    }),
  })
}

/** One record of about the same size, written with the same durability and nothing around it. */
async function bareWrites(count: number): Promise<number[]> {
  const open = indexedDB.open('bench')
  const db = await new Promise<IDBDatabase>((resolve, reject) => {
    open.onupgradeneeded = () => open.result.createObjectStore('records', { autoIncrement: true })
    open.onsuccess = () => resolve(open.result)
    open.onerror = () => reject(open.error!)
  })
  const figures: number[] = []
  for (let index = 0; index < count; index += 1) {
    const since = performance.now()
    await new Promise<void>((resolve, reject) => {
      const transaction = db.transaction('records', 'readwrite', { durability: 'strict' })
      transaction.objectStore('records').add({ index, text: 'x'.repeat(600) })
      transaction.oncomplete = () => resolve()
      transaction.onerror = () => reject(transaction.error!)
    })
    figures.push(performance.now() - since)
  }
  db.close()
  indexedDB.deleteDatabase('bench')
  return figures
}

/** A browser started anew with no network: from the start of the navigation to Today with its sheets, and on to an answered tap. */
async function measureColdStarts(): Promise<void> {
  const figures: Record<number, number[]> = { 1: [], [SLOW]: [] }
  const taps: number[] = []
  let sheets = 0
  for (let start = 0; start < COLD_STARTS; start += 1) {
    for (const rate of [1, SLOW]) {
      await phone.context.close()
      await phone.start()
      await phone.context.addInitScript(NAMES)
      await phone.offline()
      const cdp = await throttled(phone.page, rate)
      await phone.page.addInitScript(watchBoard)
      await phone.page.goto('/field')
      figures[rate]!.push(await phone.page.evaluate(() => (globalThis as unknown as { boardShown: Promise<number> }).boardShown))
      sheets = new Set((await readStore<{ t: string, data: { type?: string } }>(phone.page, 'rows')).filter(row => row.t === 'obj' && row.data.type === 'sheet')).size
      if (rate === SLOW) {
        const since = Date.now()
        await phone.page.getByRole('button', { name: 'Start a sheet', exact: true }).click()
        await phone.page.getByRole('dialog', { name: 'Start a sheet' }).waitFor()
        taps.push(Date.now() - since)
      }
      await cdp.detach()
    }
  }
  const slow = figures[SLOW]!
  lines.push({
    what: `offline cold start to Today, ${SLOW}× slower CPU, ${sheets} sheets on the phone, ${COLD_STARTS} starts`, goal: '≤ 1.5 s', measured: `median ${ms(quantile(slow, 0.5))}, worst ${ms(Math.max(...slow))}`,
    beside: `without the throttle median ${ms(quantile(figures[1]!, 0.5))}, ratio ${(quantile(slow, 0.5) / quantile(figures[1]!, 0.5)).toFixed(1)}; the first tap then opens its dialog in ${ms(quantile(taps, 0.5))}`,
  })
}

/** In the page, before anything else: when the first sheet of the board had been drawn. */
function watchBoard() {
  Object.assign(globalThis, {
    boardShown: new Promise<number>((resolve) => {
      const look = () => {
        if (document.querySelector('main a[href^="/field/sheets/"]')) setTimeout(() => resolve(performance.now()))
        else requestAnimationFrame(look)
      }
      requestAnimationFrame(look)
    }),
  })
}

async function throttled(page: Page, rate: number): Promise<CDPSession> {
  const cdp = await page.context().newCDPSession(page)
  await cdp.send('Emulation.setCPUThrottlingRate', { rate })
  return cdp
}
