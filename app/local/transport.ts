import type { PullQuery, PushRequest } from '#shared/sync/protocol'

/** What came back, whoever sent it. `body` is undefined when it was not JSON. */
export interface Answer {
  status: number
  body: unknown
  retryAfterSeconds: number | null
}

export type PullRequest = Partial<PullQuery> & { ver: number }

/** How the phone reaches the server; passed in, so that a test can be the network. */
export interface Transport {
  push: (request: PushRequest, signal: AbortSignal) => Promise<Answer>
  pull: (request: PullRequest, signal: AbortSignal) => Promise<Answer>
}

/** No answer at all: there is no network, or the server cannot be reached, or it took too long. */
export class NoAnswer extends Error {
  override readonly name = 'NoAnswer'
  constructor(readonly why: 'network' | 'timeout' | 'stopped', options?: ErrorOptions) {
    super(`No answer: ${why}.`, options)
  }
}

export const TIMEOUT_MILLISECONDS = 20_000

/** The transport of a browser. */
export function browserTransport(): Transport {
  return {
    push: (request, signal) => ask('/api/sync/push', { method: 'POST', body: request as unknown as Record<string, unknown>, signal }),
    pull: (request, signal) => ask('/api/sync/pull', { query: request, signal }),
  }
}

interface AskOptions { method?: 'POST', body?: Record<string, unknown>, query?: Record<string, unknown>, signal: AbortSignal }

async function ask(url: string, { signal, ...options }: AskOptions): Promise<Answer> {
  const timeout = AbortSignal.timeout(TIMEOUT_MILLISECONDS)
  const stop = new AbortController()
  const abort = () => stop.abort()
  signal.addEventListener('abort', abort)
  timeout.addEventListener('abort', abort)
  if (signal.aborted) abort()
  try {
    const response = await $fetch.raw<unknown>(url, {
      ...options, signal: stop.signal, responseType: 'text', ignoreResponseError: true, retry: 0,
      headers: { accept: 'application/json' }, cache: 'no-store',
    })
    return {
      status: response.status,
      body: isJson(response.headers.get('content-type')) ? parse(String(response._data ?? '')) : undefined,
      retryAfterSeconds: secondsOf(response.headers.get('retry-after')),
    }
  }
  catch (error) {
    throw new NoAnswer(timeout.aborted ? 'timeout' : signal.aborted ? 'stopped' : 'network', { cause: error })
  }
  finally {
    signal.removeEventListener('abort', abort)
  }
}

function isJson(contentType: string | null): boolean {
  return contentType !== null && /^application\/([a-z.+-]+\+)?json\b/i.test(contentType)
}

function parse(text: string): unknown {
  try {
    return JSON.parse(text)
  }
  catch {
    return undefined
  }
}

function secondsOf(text: string | null): number | null {
  const seconds = Number(text)
  return text !== null && Number.isFinite(seconds) && seconds >= 0 ? seconds : null
}
