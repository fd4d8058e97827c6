import { connect, createServer, type AddressInfo, type Socket } from 'node:net'
import { request as ask } from 'node:http'
import { ensureBuild } from '../../../../drizzle/scripts/prepare.mjs'
import { startAppServer, type RunningServer } from '../../../../drizzle/scripts/app-server.mjs'
import { freePort } from '../../../../drizzle/scripts/postgres.mjs'

const FIRST_PORT = 4710
/** Building takes minutes on a slow machine; `npm test` has built before. */
export const START_LIMIT_MILLISECONDS = 600_000

export interface Answer {
  status: number
  headers: Record<string, string | string[] | undefined>
  text: string
  /** The body as JSON; undefined when it is none. */
  json: unknown
}

export interface Asked {
  method?: string
  headers?: Record<string, string>
  /** Sent as JSON; a text or bytes go as they are. */
  body?: unknown
  cookie?: string
}

/** The built app as people run it, on a port of its own. */
export class App {
  readonly log: string[] = []
  private constructor(private readonly server: RunningServer, log: string[]) { this.log = log }

  static async start(databaseUrl: string): Promise<App> {
    await ensureBuild(() => {})
    const log: string[] = []
    const server = await startAppServer({
      databaseUrl, sessionPassword: 'a session password for tests alone, 32+', host: '127.0.0.1', port: await freePort(FIRST_PORT), isDemo: false,
      onLine: line => log.push(line),
    })
    return new App(server, log)
  }

  get url(): string { return this.server.url }

  stop(): Promise<void> { return this.server.stop() }

  /** A request as our own pages send it, unless the headers say otherwise; a header given as '' is left out. */
  ask(path: string, { method = 'GET', headers = {}, body, cookie }: Asked = {}): Promise<Answer> {
    const isRaw = typeof body === 'string' || Buffer.isBuffer(body)
    const bytes = body === undefined ? undefined : isRaw ? Buffer.from(body as string) : Buffer.from(JSON.stringify(body))
    const sent: Record<string, string> = {
      ...(method === 'GET' ? {} : { 'sec-fetch-site': 'same-origin', 'content-type': 'application/json' }),
      ...(bytes && headers['transfer-encoding'] === undefined ? { 'content-length': String(bytes.length) } : {}),
      ...(cookie ? { cookie } : {}),
      ...headers,
    }
    return new Promise((resolve, reject) => {
      const request = ask(this.url + path, { method, headers: Object.fromEntries(Object.entries(sent).filter(([, value]) => value !== '')), agent: false }, (response) => {
        const chunks: Buffer[] = []
        response.on('data', (chunk: Buffer) => chunks.push(chunk))
        response.on('error', reject)
        response.on('end', () => {
          const text = Buffer.concat(chunks).toString('utf8')
          resolve({ status: response.statusCode ?? 0, headers: response.headers, text, json: parsed(text) })
        })
      })
      request.on('error', reject)
      request.end(bytes)
    })
  }

  /** Signs in and gives the cookie to send. */
  async signIn(person: { email: string, password: string }, cookie?: string): Promise<string> {
    const answer = await this.ask('/api/session', { method: 'POST', body: { email: person.email, password: person.password }, cookie })
    if (answer.status !== 200) throw new Error(`Signing in gave ${answer.status}: ${answer.text}`)
    return cookieOf(answer)
  }
}

/** The session cookie of an answer as it is sent back. */
export function cookieOf(answer: Answer): string {
  const set = ([] as string[]).concat(answer.headers['set-cookie'] ?? []).find(line => line.startsWith('__Host-sid='))
  if (set === undefined) throw new Error('The answer sets no session cookie.')
  return set.split(';')[0]!
}

function parsed(text: string): unknown {
  try {
    return JSON.parse(text)
  }
  catch {
    return undefined
  }
}

/** A wire to the database that a test can cut and mend. */
export async function openWire(databaseUrl: string): Promise<{ url: string, cut: () => void, mend: () => void, close: () => Promise<void> }> {
  const target = new URL(databaseUrl)
  const open = new Set<Socket>()
  let isCut = false
  const server = createServer((near) => {
    if (isCut) return void near.destroy()
    const far = connect(Number(target.port), target.hostname)
    for (const [socket, other] of [[near, far], [far, near]] as const) {
      open.add(socket)
      socket.on('error', () => other.destroy())
      socket.on('close', () => {
        open.delete(socket)
        other.destroy()
      })
      socket.pipe(other)
    }
  })
  await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  const url = new URL(databaseUrl)
  url.port = String((server.address() as AddressInfo).port)
  const cut = () => {
    isCut = true
    for (const socket of open) socket.destroy()
  }
  return {
    url: url.href, cut,
    mend: () => { isCut = false },
    close: () => new Promise((resolve) => {
      cut()
      server.close(() => resolve())
    }),
  }
}
