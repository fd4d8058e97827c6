import { expect, test } from '@playwright/test'
import { killServer, restartDatabase, restartServer, startServer, stopServer } from './support/server-control'

async function isHealthy(baseURL: string | undefined): Promise<boolean> {
  try {
    return (await fetch(`${baseURL}/api/health`)).status === 200
  }
  catch {
    return false
  }
}

test('the server comes back on the same address after a stop, a power cut and a power cut of the database', async ({ baseURL }) => {
  expect(await isHealthy(baseURL)).toBe(true)
  await stopServer()
  expect(await isHealthy(baseURL)).toBe(false)
  await startServer()
  expect(await isHealthy(baseURL)).toBe(true)
  await killServer()
  expect(await isHealthy(baseURL)).toBe(false)
  await startServer()
  await restartServer()
  expect(await isHealthy(baseURL)).toBe(true)
  await restartDatabase()
  await expect.poll(() => isHealthy(baseURL), { message: 'the server finds its database again without a restart' }).toBe(true)
})
