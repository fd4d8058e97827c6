import type { Plugin } from 'vite'

/**
 * Which script of the browser a module goes into. The whole field is one chunk, so that one visit brings all of it: a page
 * that was never opened before works with no network, and an update can never find half of an old build. The office has its
 * own, which phones never load; what both need is apart from either.
 *
 * @param id path of the module, as Rollup names it
 * @returns the chunk's name, or undefined where Rollup decides
 */
export function chunkOf(id: string): string | undefined {
  const path = id.split('?')[0]!
  // Nuxt's generated lists of routes and layouts name every room; they stay where Rollup puts them.
  if (path.includes('virtual:') || path.includes('/.nuxt/')) return undefined
  if (/\/node_modules\/(dexie|uuidv7)\//.test(path) || /\/app\/(local|composables|stores|utils)\//.test(path)) return 'kit'
  if (path.includes('/node_modules/zod/') || /\/shared\/(domain|records|assessment|sync|access)\//.test(path)) return 'shared'
  if (/\/node_modules\/(vue|@vue|vue-router|pinia|ofetch|ufo|devalue|ohash|unhead|@unhead|hookable|lucide-vue-next)\//.test(path)) return 'vendor'
  if (/\/app\/(pages|components|layouts)\/field(\/|\.vue$)/.test(path)) return 'field'
  if (/\/app\/(pages|components|layouts)\/office(\/|\.vue$)/.test(path)) return 'office'
  if (/\/app\/components\/(ui\/|RibbonStrip|Lapel)/.test(path)) return 'parts'
  return undefined
}

/**
 * Dexie's own entry is written for old browsers; this is the same code for those that run a service worker, a quarter
 * smaller.
 */
export function modernDexie(): Plugin {
  return {
    name: 'lapel-modern-dexie',
    enforce: 'pre',
    apply: 'build',
    resolveId(source, importer) {
      return source === 'dexie' ? this.resolve('dexie/dist/modern/dexie.mjs', importer, { skipSelf: true }) : null
    },
  }
}
