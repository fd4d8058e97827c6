import { createConfigForNuxt } from '@nuxt/eslint-config'

// Node 20 lacks this one function, which the config composer of ESLint's Nuxt preset calls.
Object.groupBy ??= (items, keyOf) => {
  const groups = Object.create(null)
  let index = 0
  for (const item of items) (groups[keyOf(item, index++)] ??= []).push(item)
  return groups
}

export default createConfigForNuxt({
  features: { stylistic: true, typescript: true },
  dirs: { src: ['./app'] },
}).prepend({
  ignores: ['.nuxt/**', '.output/**', '.data/**', 'node_modules/**', 'public/**', 'drizzle/migrations/**', 'test-results/**', 'playwright-report/**', 'tests/screens/out/**'],
}).append({
  rules: {
    'vue/no-v-html': 'error',
    'vue/multi-word-component-names': 'off',
    '@stylistic/max-statements-per-line': 'off',
    'no-restricted-syntax': ['error',
      { selector: 'ImportDeclaration[source.value="zod"] > ImportSpecifier', message: 'Write `import * as z from \'zod\'`: a named import brings every locale into the bundle.' },
      { selector: 'MemberExpression[object.name="sql"][property.name="raw"]', message: 'sql.raw is not used: pass values as parameters.' },
    ],
  },
})
