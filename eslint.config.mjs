import { createConfigForNuxt } from '@nuxt/eslint-config'

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
