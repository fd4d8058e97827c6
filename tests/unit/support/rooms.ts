// Which room may import from which, and a reader of import lines that names every one that climbs the wrong stairs.
import { posix } from 'node:path'
import ts from 'typescript'

/** What an import line points at: a room of ours (a path from the top of the project) or a package. */
interface Target { kind: 'room' | 'package', name: string }

interface Rule {
  /** Path prefixes the rule governs. The first rule that fits a file is the one that counts. */
  from: string[]
  /** Path prefixes this room may import, besides itself. */
  rooms: string[]
  /** Packages it may import; 'any' but those in `not`. */
  packages: string[] | 'any'
  not?: string[]
  /** Path prefixes refused although a wider prefix above allows them. */
  except?: string[]
  /** Functions that come without an import line, by Nuxt, and may not be called here. */
  calls?: string[]
  /** The rule in words, for the failure. */
  says: string
}

const VUE = ['vue', 'vue-router', 'pinia', '@vueuse/core', 'nuxt', '#imports', '#app', '#components']
const SERVER_ONLY = ['pg', 'drizzle-orm', 'h3', 'nitropack', '@adonisjs/hash', 'node:']
const REQUEST = ['h3', 'nitropack', '#imports', ...VUE]
const FETCHING = ['$fetch', 'useFetch', 'useLazyFetch', 'useRequestFetch']
const EVENT_CALLS = ['useRuntimeConfig', 'defineEventHandler', 'getHeader', 'readBody', 'getQuery', 'useStorage']
const APP_ROOMS = ['app/', 'shared/']

const RULES: Rule[] = [
  { from: ['shared/domain/'], rooms: [], packages: [], says: 'shared/domain imports only itself' },
  { from: ['shared/records/'], rooms: [], packages: ['zod'], says: 'shared/records imports zod and itself' },
  { from: ['shared/assessment/'], rooms: ['shared/domain/', 'shared/records/'], packages: [], says: 'shared/assessment imports shared/domain and shared/records' },
  { from: ['shared/sync/', 'shared/access/'], rooms: ['shared/records/'], packages: ['zod'], says: 'shared/sync and shared/access import shared/records and zod' },
  { from: ['shared/types/'], rooms: ['shared/records/'], packages: ['#auth-utils'], says: 'shared/types imports shared/records' },
  { from: ['app/local/'], rooms: ['shared/'], packages: ['dexie', 'uuidv7'], says: 'app/local imports shared, dexie and uuidv7: no Vue, no Pinia, no screen' },
  { from: ['app/composables/', 'app/stores/'], rooms: ['shared/', 'app/local/', 'app/utils/', 'app/composables/', 'app/stores/'], packages: 'any', not: ['dexie', ...SERVER_ONLY], says: 'composables and stores import shared and ~/local: no server, no component' },
  { from: ['app/utils/'], rooms: ['shared/', 'app/components/', 'app/composables/'], packages: 'any', not: ['dexie', ...SERVER_ONLY], says: 'app/utils imports shared and the front rooms: no ~/local, no page' },
  { from: ['app/components/'], rooms: ['shared/', 'app/composables/', 'app/stores/', 'app/utils/'], packages: 'any', not: ['dexie', ...SERVER_ONLY], calls: FETCHING, says: 'components import shared, composables, stores and other components: never ~/local, never a fetch' },
  { from: ['app/pages/field/'], rooms: APP_ROOMS, packages: 'any', not: ['dexie', ...SERVER_ONLY], calls: FETCHING, says: 'field pages import from app and shared and never fetch: they work offline' },
  { from: ['app/pages/office/'], rooms: APP_ROOMS, except: ['app/local/'], packages: 'any', not: ['dexie', ...SERVER_ONLY], says: 'office pages import from app and shared, never ~/local' },
  { from: ['app/'], rooms: APP_ROOMS, packages: 'any', not: ['dexie', ...SERVER_ONLY], says: 'app imports from app and shared' },
  { from: ['server/api/', 'server/routes/'], rooms: ['server/services/', 'server/database/', 'server/utils/', 'server/storage/', 'server/reports/', 'shared/'], except: ['server/database/tables/', 'server/database/schema', 'server/api/', 'server/routes/'], packages: 'any', not: VUE, says: 'handlers import services, queries, server/utils and shared: no table, no other handler' },
  { from: ['server/services/'], rooms: ['server/database/', 'server/mail/', 'server/storage/', 'server/reports/', 'shared/'], packages: 'any', not: REQUEST, calls: EVENT_CALLS, says: 'services import tables, queries, mail, storage and shared: no h3 event, no runtime config' },
  { from: ['server/database/'], rooms: ['shared/'], packages: 'any', not: REQUEST, calls: EVENT_CALLS, says: 'server/database imports shared and itself' },
  { from: ['server/mail/'], rooms: ['shared/'], packages: 'any', not: VUE, says: 'server/mail imports shared and itself' },
  { from: ['server/storage/'], rooms: ['shared/'], packages: 'any', not: VUE, says: 'server/storage imports shared and itself' },
  { from: ['server/reports/'], rooms: ['shared/'], packages: 'any', not: VUE, says: 'server/reports imports shared and itself' },
  { from: ['server/jobs/', 'server/middleware/', 'server/plugins/', 'server/tasks/', 'server/types/', 'server/utils/'], rooms: ['server/', 'shared/'], except: ['server/api/', 'server/routes/'], packages: 'any', not: VUE, says: 'the rest of the server imports server and shared: no handler' },
  { from: ['drizzle/scripts/', 'drizzle/seeds/'], rooms: ['server/database/', 'server/services/', 'shared/', 'drizzle/scripts/', 'drizzle/seeds/'], packages: 'any', not: REQUEST, says: 'drizzle imports server/database, server/services and shared' },
]

/**
 * Names every import of one file that its room may not have, and every call that its room may not make.
 * @param path from the top of the project, with forward slashes
 * @returns one sentence for each, with the line and the rule
 */
export function roomViolations(path: string, source: string): string[] {
  const rule = RULES.find(candidate => candidate.from.some(prefix => path.startsWith(prefix)))
  if (rule === undefined) return [`${path} is in no room: the design has no such folder`]
  const own = rule.from.find(prefix => path.startsWith(prefix)) ?? ''
  const violations: string[] = []
  for (const { code, offset } of scriptsOf(path, source)) {
    for (const { specifier, line } of importsOf(code)) {
      const target = specifier === null ? null : resolveImport(path, specifier)
      if (target === null) violations.push(`${path}:${line + offset} imports a computed path, which cannot be checked`)
      else if (!isAllowed(rule, own, target)) violations.push(`${path}:${line + offset} imports '${specifier}', but ${rule.says}`)
    }
    for (const { name, line } of callsOf(code, rule.calls ?? [])) violations.push(`${path}:${line + offset} calls ${name}, but ${rule.says}`)
  }
  if (path.endsWith('.vue')) {
    const template = source.replace(/<(script|style)\b[\s\S]*?<\/\1>/g, '')
    for (const name of rule.calls ?? []) {
      if (new RegExp(`(?<![\\w.])${name.replace('$', '\\$')}\\s*\\(`).test(template)) violations.push(`${path} calls ${name} in its template, but ${rule.says}`)
    }
  }
  return violations
}

function isAllowed(rule: Rule, own: string, target: Target): boolean {
  if (target.kind === 'package') {
    const isNamed = (list: string[]): boolean => list.some(name => target.name === name || target.name.startsWith(name.endsWith(':') ? name : `${name}/`))
    return rule.packages === 'any' ? !isNamed(rule.not ?? []) : isNamed(rule.packages)
  }
  if ((rule.except ?? []).some(prefix => target.name.startsWith(prefix))) return false
  return [own, ...rule.rooms].some(prefix => target.name.startsWith(prefix))
}

function resolveImport(path: string, specifier: string): Target {
  const bare = specifier.replace(/[?].*$/, '')
  const aliases: [string, string][] = [['#shared/', 'shared/'], ['#server/', 'server/'], ['~~/', ''], ['@@/', ''], ['~/', 'app/'], ['@/', 'app/']]
  for (const [alias, folder] of aliases) {
    if (bare.startsWith(alias)) return { kind: 'room', name: posix.normalize(folder + bare.slice(alias.length)) }
  }
  if (bare.startsWith('.')) return { kind: 'room', name: posix.normalize(posix.join(posix.dirname(path), bare)) }
  return { kind: 'package', name: bare }
}

/** The script blocks of a component, or the whole of a plain file, with the number of lines before each. */
function scriptsOf(path: string, source: string): { code: string, offset: number }[] {
  if (!path.endsWith('.vue')) return [{ code: source, offset: 0 }]
  return [...source.matchAll(/<script\b[^>]*>([\s\S]*?)<\/script>/g)].map((block) => {
    const start = block.index + block[0].indexOf('>') + 1
    return { code: block[1] ?? '', offset: source.slice(0, start).split('\n').length - 1 }
  })
}

function parse(code: string): ts.SourceFile {
  return ts.createSourceFile('file.ts', code, ts.ScriptTarget.Latest, true, ts.ScriptKind.TS)
}

function lineOf(file: ts.SourceFile, node: ts.Node): number {
  return file.getLineAndCharacterOfPosition(node.getStart(file)).line + 1
}

/** Static, dynamic, type, re-exporting and globbing imports; null stands for a path worked out at run time. */
function importsOf(code: string): { specifier: string | null, line: number }[] {
  const file = parse(code)
  const found: { specifier: string | null, line: number }[] = []
  const add = (node: ts.Node, specifier: ts.Node | undefined): void => {
    found.push({ specifier: specifier !== undefined && ts.isStringLiteralLike(specifier) ? specifier.text : null, line: lineOf(file, node) })
  }
  const visit = (node: ts.Node): void => {
    if (ts.isImportDeclaration(node)) add(node, node.moduleSpecifier)
    else if (ts.isExportDeclaration(node) && node.moduleSpecifier !== undefined) add(node, node.moduleSpecifier)
    else if (ts.isImportEqualsDeclaration(node) && ts.isExternalModuleReference(node.moduleReference)) add(node, node.moduleReference.expression)
    else if (ts.isImportTypeNode(node)) add(node, ts.isLiteralTypeNode(node.argument) ? node.argument.literal : undefined)
    else if (ts.isCallExpression(node)) {
      const called = node.expression.getText(file)
      if (node.expression.kind === ts.SyntaxKind.ImportKeyword || called === 'require' || called === 'import.meta.glob') {
        const argument = node.arguments[0]
        const items = argument !== undefined && ts.isArrayLiteralExpression(argument) ? [...argument.elements] : [argument]
        for (const item of items) add(node, item)
      }
    }
    ts.forEachChild(node, visit)
  }
  visit(file)
  return found
}

/** Where functions of these names are used, called at once or handed on. */
function callsOf(code: string, names: string[]): { name: string, line: number }[] {
  const file = parse(code)
  const found: { name: string, line: number }[] = []
  const visit = (node: ts.Node): void => {
    if (ts.isIdentifier(node) && names.includes(node.text) && !isPropertyName(node)) found.push({ name: node.text, line: lineOf(file, node) })
    ts.forEachChild(node, visit)
  }
  if (names.length > 0) visit(file)
  return found
}

/** `row.getQuery` and `{ getQuery: 1 }` are names of something else; `globalThis.$fetch` is not. */
function isPropertyName(node: ts.Identifier): boolean {
  const { parent } = node
  if (ts.isPropertyAccessExpression(parent) && parent.name === node) return parent.expression.getText() !== 'globalThis'
  return ts.isPropertyAssignment(parent) && parent.name === node
}
