import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { gzipSync } from 'node:zlib'

interface Chunk { fileName: string, name: string, modules: { id: string, bytes: number }[] }

/** From the path of a module to the room it belongs to; the first that fits. */
const ROOMS: readonly [string, RegExp][] = [
  ['Vue, its router and Pinia', /\/node_modules\/(@vue|vue|vue-router|pinia)\//],
  ['Nuxt and its helpers', /\/node_modules\/(nuxt|@nuxt|ofetch|ufo|devalue|ohash|unhead|@unhead|hookable|defu|destr|unctx|h3|klona|perfect-debounce|cookie-es|nuxt-auth-utils|nuxt-security|@pinia|@vite-pwa|workbox-window|vite|std-env)\/|virtual:|\/\.nuxt\/|vite/],
  ['Dexie', /\/node_modules\/dexie\//],
  ['zod', /\/node_modules\/zod\//],
  ['VueUse, icons, identities', /\/node_modules\/(@vueuse|lucide-vue-next|uuidv7)\//],
  ['shared: records, numbers, findings, merge', /\/shared\/(domain|records|assessment|sync|access)\//],
  ['app: the phone’s database and sync', /\/app\/local\//],
  ['app: pages and parts of the field', /\/app\/(pages|components|layouts)\/field(\/|\.vue)/],
  ['app: parts that all rooms share', /\/app\/components\/(ui\/|RibbonStrip|Lapel)/],
  ['app: everything else', /\/app\//],
]

export interface ScriptBytes { total: number, files: { name: string, bytes: number }[], rooms: { room: string, bytes: number }[] }

/**
 * Weighs scripts as they are sent, with gzip.
 *
 * @param checkout folder of the project, built
 * @param fileNames scripts as a browser asked for them, such as `_nuxt/kit.x.js`
 * @returns bytes; what a room has of a file is its share of the file's text before it was made small
 */
export function weighScripts(checkout: string, fileNames: readonly string[]): ScriptBytes {
  const chunks = new Map((JSON.parse(readFileSync(join(checkout, '.nuxt', 'browser-bundle.json'), 'utf8')) as Chunk[]).map(chunk => [chunk.fileName, chunk]))
  const rooms = new Map<string, number>()
  const files = fileNames.map((fileName) => {
    const bytes = gzipSync(readFileSync(join(checkout, '.output', 'public', fileName)), { level: 9 }).length
    const modules = chunks.get(fileName)?.modules ?? []
    const text = modules.reduce((sum, module) => sum + module.bytes, 0)
    for (const module of modules) {
      const room = ROOMS.find(([, path]) => path.test(module.id))?.[0] ?? 'other'
      rooms.set(room, (rooms.get(room) ?? 0) + bytes * module.bytes / text)
    }
    return { name: chunks.get(fileName)?.name ?? fileName, bytes }
  })
  return {
    total: files.reduce((sum, file) => sum + file.bytes, 0),
    files: files.sort((one, other) => other.bytes - one.bytes),
    rooms: [...rooms].map(([room, bytes]) => ({ room, bytes })).sort((one, other) => other.bytes - one.bytes),
  }
}
