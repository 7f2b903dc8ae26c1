import withNuxt from './.nuxt/eslint.config.mjs'

export default withNuxt(
  {
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/ban-ts-comment': 'error',
      'vue/multi-word-component-names': 'off',
      'vue/max-attributes-per-line': 'off',
      'vue/singleline-html-element-content-newline': 'off',
      'vue/html-self-closing': 'off',
    },
  },
  {
    // The browser never reaches the server's rooms, and shared/ reaches neither.
    files: ['pages/**', 'layouts/**', 'components/**', 'stores/**', 'composables/**', 'app.vue', 'error.vue'],
    rules: { 'no-restricted-imports': ['error', { patterns: ['**/server/**', '**/drizzle/**', 'drizzle-orm*', 'pg'] }] },
  },
  {
    files: ['shared/**'],
    rules: { 'no-restricted-imports': ['error', { patterns: ['**/server/**', '**/drizzle/**', '~/*', 'vue', 'h3', 'drizzle-orm*', 'pg', '#imports'] }] },
  },
)
