import jsdoc from 'eslint-plugin-jsdoc'
import withNuxt from './.nuxt/eslint.config.mjs'

const ban = (regex, message) => ({ 'no-restricted-imports': ['error', { patterns: [{ regex, message }] }] })

export default withNuxt(
  { ignores: ['drizzle/**', 'tests/fixtures/**', 'tests/reference/data/**'] },
  { files: ['shared/**'], rules: ban('^(vue|pinia|h3|nitropack|drizzle-orm|node:|#app|#imports|#server|~)', 'shared/ is pure: no Vue, Nitro, Node or database') },
  {
    files: ['app.vue', 'error.vue', 'pages/**', 'components/**', 'composables/**', 'stores/**', 'layouts/**', 'middleware/**', 'plugins/**'],
    rules: ban('^(#server|~~?/server|drizzle-orm|stripe)', 'server code must not reach the browser'),
  },
  { files: ['server/**'], rules: ban('^(~/|#app|vue$|pinia)', 'no Vue code in Nitro') },
  {
    files: ['server/**', 'shared/**'],
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      'no-empty': ['error', { allowEmptyCatch: false }],
    },
  },
  {
    files: ['shared/**/*.ts', 'server/services/**/*.ts'],
    plugins: { jsdoc },
    rules: { 'jsdoc/require-jsdoc': ['error', { publicOnly: true, require: { FunctionDeclaration: true, ArrowFunctionExpression: true } }] },
  },
  { files: ['pages/**/*.vue', 'layouts/*.vue', 'error.vue', 'app.vue'], rules: { 'vue/multi-word-component-names': 'off' } },
)
