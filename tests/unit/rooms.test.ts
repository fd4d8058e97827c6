import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { describe, expect, test } from 'vitest'
import { roomViolations } from './support/rooms'

const ROOMS = ['app', 'server', 'shared', 'drizzle']
const TOP_LEVEL = [
  'app', 'server', 'shared', 'public', 'drizzle', 'tests',
  'nuxt.config.ts', 'drizzle.config.ts', 'tailwind.config.ts', 'tsconfig.json', 'vitest.config.ts', 'playwright.config.ts', 'eslint.config.mjs',
  'package.json', 'package-lock.json', 'README.md', 'DEVELOPERS.md',
]
const root = new URL('../../', import.meta.url)

function filesUnder(folder: string): string[] {
  if (!existsSync(new URL(folder, root))) return []
  return readdirSync(new URL(folder, root), { recursive: true, withFileTypes: true })
    .filter(entry => entry.isFile() && /\.(?:ts|mts|cts|vue|mjs|js)$/.test(entry.name))
    .map(entry => `${entry.parentPath}/${entry.name}`.replaceAll('//', '/').slice(root.pathname.length))
}

describe('the rooms of the house', () => {
  for (const room of ROOMS) {
    test(`nothing in ${room} imports from where it may not`, () => {
      const files = filesUnder(room)
      expect(files.length).toBeGreaterThan(0)
      expect(files.flatMap(path => roomViolations(path, readFileSync(new URL(path, root), 'utf8')))).toEqual([])
    })
  }

  test('nothing stands at the top beside what the tools insist on', () => {
    const ignored = readFileSync(new URL('.gitignore', root), 'utf8').split('\n').filter(line => line !== '')
    const entries = readdirSync(root).filter(name => !name.startsWith('.') && !ignored.includes(`${name}/`) && !(name.endsWith('.log') && ignored.includes('*.log')))
    expect(entries.filter(name => !TOP_LEVEL.includes(name))).toEqual([])
  })
})

describe('the reader of import lines', () => {
  const planted: [string, string, string][] = [
    ['shared/domain/volume.ts', 'import * as z from \'zod\'', 'shared/domain imports only itself'],
    ['shared/domain/volume.ts', 'import type { Sheet } from \'#shared/records/sheet\'', 'shared/domain imports only itself'],
    ['shared/domain/volume.ts', 'import { x } from \'../records/sheet\'', 'shared/domain imports only itself'],
    ['shared/records/sheet.ts', 'export { mean } from \'#shared/domain/mean\'', 'shared/records imports zod and itself'],
    ['shared/records/sheet.ts', 'export * from \'../../server/database/schema\'', 'shared/records imports zod and itself'],
    ['shared/assessment/assess.ts', 'import \'dexie\'', 'shared/assessment imports'],
    ['shared/assessment/assess.ts', 'import * as z from \'zod\'', 'shared/assessment imports'],
    ['shared/sync/merge.ts', 'import { can } from \'#shared/access/policy\'', 'shared/sync and shared/access import'],
    ['app/local/db.ts', 'import { ref } from \'vue\'', 'no Vue'],
    ['app/local/db.ts', 'import { useClockStore } from \'~/stores/clock\'', 'no Pinia'],
    ['app/composables/useSheet.ts', 'const x = await import(\'#server/services/apply-push\')', 'no server'],
    ['app/stores/sync.ts', 'import Badge from \'~/components/field/FieldSyncBadge.vue\'', 'no component'],
    ['app/components/field/FieldFlowPad.vue', '<script setup lang="ts">\nimport { db } from \'~/local/db\'\n</script>', 'never ~/local'],
    ['app/components/field/FieldFlowPad.vue', '<script setup lang="ts">\nimport { db } from \'../../local/db\'\n</script>', 'never ~/local'],
    ['app/components/field/FieldFlowPad.vue', '<script setup lang="ts">\nconst x = await $fetch(\'/api/x\')\n</script>', 'never a fetch'],
    ['app/components/field/FieldFlowPad.vue', '<script setup lang="ts">\nconst x = globalThis.$fetch\n</script>', 'never a fetch'],
    ['app/components/field/FieldFlowPad.vue', '<template>\n<button @click="$fetch(\'/api/x\')" />\n</template>', 'never a fetch'],
    ['app/pages/field/index.vue', '<script setup lang="ts">\nconst { data } = useFetch(\'/api/x\')\n</script>', 'never fetch'],
    ['app/pages/office/index.vue', '<script setup lang="ts">\nimport type { Db } from \'~/local/db\'\n</script>', 'never ~/local'],
    ['app/pages/office/index.vue', '<script setup lang="ts">\nimport Dexie from \'dexie\'\n</script>', 'never ~/local'],
    ['app/utils/format.ts', 'import { db } from \'~/local/db\'', 'no ~/local'],
    ['app/plugins/sync.client.ts', 'import { x } from \'~~/server/utils/x\'', 'app imports from app and shared'],
    ['server/api/sheets/index.get.ts', 'import { sheets } from \'#server/database/tables/sheets\'', 'no table'],
    ['server/api/sheets/index.get.ts', 'import other from \'./[sheetId].get\'', 'no other handler'],
    ['server/services/apply-push.ts', 'import type { H3Event } from \'h3\'', 'no h3 event'],
    ['server/services/apply-push.ts', 'const x = useRuntimeConfig()', 'no runtime config'],
    ['server/services/apply-push.ts', 'import { requireUser } from \'#server/utils/require-user\'', 'services import'],
    ['server/database/client.ts', 'import { applyPush } from \'../services/apply-push\'', 'server/database imports'],
    ['server/reports/render.ts', 'type X = import(\'../services/decide-sheet\').Decision', 'server/reports imports'],
    ['server/utils/x.ts', 'import x from \'../api/health.get\'', 'no handler'],
    ['drizzle/seeds/people.ts', 'import { x } from \'~/utils/format\'', 'drizzle imports'],
    ['drizzle/scripts/seed.ts', 'const x = require(\'../../server/api/health.get\')', 'drizzle imports'],
    ['shared/domain/volume.ts', 'const x = import.meta.glob(\'../records/*.ts\')', 'shared/domain imports only itself'],
    ['shared/domain/volume.ts', 'const x = await import(name)', 'cannot be checked'],
    ['shared/helpers/x.ts', '', 'in no room'],
    ['server/helpers/x.ts', '', 'in no room'],
  ]
  test.each(planted)('catches in %s: %s', (path, source, rule) => {
    const violations = roomViolations(path, source)
    expect(violations).toHaveLength(1)
    expect(violations[0]).toContain(rule)
    expect(violations[0]).toContain(path)
  })

  const welcome: [string, string][] = [
    ['shared/domain/volume.ts', 'import { litres } from \'./units\'\nimport { mean } from \'#shared/domain/mean\''],
    ['shared/domain/group/tolerance.ts', 'import { normal } from \'../distributions/normal\''],
    ['shared/records/sheet.ts', 'import * as z from \'zod\'\nimport { idSchema } from \'./base\''],
    ['app/local/sync-engine.ts', 'import { merge } from \'#shared/sync/merge\'\nconst answer = await $fetch(\'/api/sync/pull\')'],
    ['app/pages/office/index.vue', '<script setup lang="ts">\nconst { data } = await useFetch(\'/api/surveys\')\n</script>'],
    ['app/pages/field/index.vue', '<script setup lang="ts">\n// no $fetch( here\nimport { device } from \'~/local/device\'\n</script>'],
    ['server/api/sheets/index.get.ts', 'import { listSheets } from \'#server/database/queries/sheets\''],
    ['server/services/apply-push.ts', 'import { sheets } from \'#server/database/tables/sheets\'\nconst x = row.getQuery'],
    ['drizzle/scripts/seed.ts', 'import pg from \'pg\'\nimport { people } from \'../seeds/people\''],
  ]
  test.each(welcome)('lets pass in %s: %s', (path, source) => {
    expect(roomViolations(path, source)).toEqual([])
  })

  test('says the line of an import inside a component', () => {
    expect(roomViolations('app/components/A.vue', '<template>\n  <p />\n</template>\n\n<script setup lang="ts">\nimport \'dexie\'\n</script>')[0]).toContain('A.vue:6 ')
  })
})
