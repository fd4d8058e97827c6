import type { Plugin } from 'vite'

/** What Rollup tells of the graph of modules. */
interface Graph { getModuleInfo: (id: string) => { importers: readonly string[], dynamicImporters: readonly string[] } | null }

/**
 * Which script of the browser a module goes into. The whole field is one chunk, so that one visit brings all of it: a page
 * that was never opened before works with no network, and an update can never find half of an old build. The office has its
 * own, with all that nobody else needs; phones never load it. What both need is apart from either.
 *
 * @param id path of the module, as Rollup names it
 * @returns the chunk's name, or undefined where Rollup decides
 */
export function chunkOf(id: string, graph: Graph): string | undefined {
  const path = pathOf(id)
  // Nuxt's generated lists of routes and layouts name every room, and ask each page for its route's settings (`?macro=true`);
  // they stay where Rollup puts them, or the entry would bring every page.
  if (isList(path) || id.includes('macro=true')) return undefined
  if (isOfficePage(path) || isForOfficeOnly(id, graph)) return 'office'
  if (/\/node_modules\/(dexie|uuidv7)\//.test(path) || /\/app\/(local|composables|stores|utils)\//.test(path)) return 'kit'
  if (path.includes('/node_modules/zod/') || /\/shared\/(domain|records|assessment|sync|access)\//.test(path)) return 'shared'
  if (/\/node_modules\/(vue|@vue|vue-router|pinia|ofetch|ufo|devalue|ohash|unhead|@unhead|hookable|lucide-vue-next)\//.test(path)) return 'vendor'
  if (/\/app\/(pages|components|layouts)\/field(\/|\.vue$)/.test(path)) return 'field'
  if (/\/app\/components\/(ui\/|RibbonStrip|Lapel)/.test(path)) return 'parts'
  return undefined
}

const pathOf = (id: string) => id.split('?')[0]!
const isList = (path: string) => path.includes('virtual:') || path.includes('/.nuxt/')
const isOfficePage = (path: string) => /\/app\/(pages|components|layouts)\/office(\/|\.vue$)/.test(path)

/** Whether every way to a module, up from importer to importer, comes from a page or a part of the office. */
function isForOfficeOnly(id: string, { getModuleInfo }: Graph): boolean {
  const seen = new Set([id])
  const toAsk = [id]
  let isAskedByOffice = false
  for (let next = toAsk.pop(); next !== undefined; next = toAsk.pop()) {
    const info = getModuleInfo(next)
    const importers = [...info?.importers ?? [], ...info?.dynamicImporters ?? []]
    if (importers.length === 0) return false
    for (const importer of importers) {
      const path = pathOf(importer)
      if (isOfficePage(path)) isAskedByOffice = true
      else if (isList(path)) return false
      else if (!seen.has(importer)) {
        seen.add(importer)
        toAsk.push(importer)
      }
    }
  }
  return isAskedByOffice
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

/**
 * zod carries a writer of JSON Schema with every schema. The browser only reads with them, so it gets the schemas without it, a
 * sixth of zod; whoever calls it there is told.
 */
export function zodWithoutJsonSchema(): Plugin {
  const NOTHING = '\0zod-without-json-schema'
  return {
    name: 'lapel-zod-without-json-schema',
    enforce: 'pre',
    apply: 'build',
    resolveId: (source, importer) => importer?.includes('/zod/v4/') && /\/(to-json-schema|json-schema-processors|json-schema-generator)\.js$/.test(source) ? NOTHING : null,
    load: id => id === NOTHING ? { code: WITHOUT_JSON_SCHEMA, syntheticNamedExports: true } : null,
  }
}

const WITHOUT_JSON_SCHEMA = `
const missing = () => () => { throw new Error('JSON Schema is not part of the browser’s zod.') }
export default { createToJSONSchemaMethod: missing, createStandardJSONSchemaMethod: missing }
`
