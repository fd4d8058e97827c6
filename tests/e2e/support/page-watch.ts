import type { Page } from '@playwright/test'

/** What a page asked for and complained of while it was watched. */
export interface PageWatch {
  /** Addresses of other hosts that it asked. */
  foreign: string[]
  /** What the content security policy refused. */
  refused: string[]
  /** Exceptions that nobody caught. */
  errors: string[]
}

export function watchPage(page: Page): PageWatch {
  const watch: PageWatch = { foreign: [], refused: [], errors: [] }
  page.on('request', (request) => {
    const url = new URL(request.url())
    const own = page.url() === 'about:blank' ? url.host : new URL(page.url()).host
    if (/^https?:$/.test(url.protocol) && url.host !== own) watch.foreign.push(request.url())
  })
  page.on('console', (message) => {
    if (message.type() === 'error' && /content security policy/i.test(message.text())) watch.refused.push(message.text())
  })
  page.on('pageerror', error => watch.errors.push(error.message))
  return watch
}
