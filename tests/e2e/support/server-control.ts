// Starts and stops the app under test from within a browser test. Works under `npm test e2e`, whose runner owns the server.

async function act(name: 'stop' | 'kill' | 'start' | 'restart' | 'restart-database'): Promise<void> {
  const control = process.env.E2E_SERVER_CONTROL
  if (control === undefined) throw new Error('This test starts and stops the server: run it by `npm test e2e`.')
  const response = await fetch(`${control}/${name}`, { method: 'POST' })
  if (!response.ok) throw new Error(`The server could not ${name}: ${await response.text()}`)
}

/** Ends the server as Ctrl-C would: what it is answering is finished first. */
export const stopServer = (): Promise<void> => act('stop')

/** Ends the server at once, as a power cut would. */
export const killServer = (): Promise<void> => act('kill')

/** Starts the server on the same address and waits until it is ready; nothing happens when it runs. */
export const startServer = (): Promise<void> => act('start')

/** Ends the server as a power cut would and starts it again. */
export const restartServer = (): Promise<void> => act('restart')

/** Ends the database as a power cut would and lets it recover, under the running server. */
export const restartDatabase = (): Promise<void> => act('restart-database')
