import withNuxt from './.nuxt/eslint.config.mjs'

export default withNuxt(
  { ignores: ['tools/**', 'server/database/migrations/**', 'reports/**'] },
  {
    rules: {
      'vue/multi-word-component-names': 'off',
      'vue/html-self-closing': ['error', { html: { void: 'any' } }],
      '@typescript-eslint/no-explicit-any': 'error',
      '@stylistic/max-statements-per-line': 'off',
    },
  },
)
