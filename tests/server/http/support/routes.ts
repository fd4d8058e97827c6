import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

export interface Route { method: string, path: string }

/** Every route of the API, read from the names of its files as the server does. */
export function apiRoutes(): Route[] {
  const folder = fileURLToPath(new URL('../../../../server/api', import.meta.url))
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter(file => file.endsWith('.ts') && !file.includes('[...'))
    .map((file) => {
      const [name, verb] = file.replace(/\.ts$/, '').split(/\.(?=[^.]*$)/)
      return { method: (verb ?? '').toUpperCase(), path: `/api/${name}`.replace(/\/index$/, '').replace(/\[(\w+)\]/g, ':$1') }
    })
    .sort((a, b) => (`${a.path} ${a.method}` < `${b.path} ${b.method}` ? -1 : 1))
}

export const nameOf = ({ method, path }: Route) => `${method} ${path}`
