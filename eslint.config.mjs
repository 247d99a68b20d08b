import withNuxt from './.nuxt/eslint.config.mjs'

/** One block a floor: imports point down, and `shared/analysis` knows no file, row or pixel. */
const floor = (files, patterns, message) => ({
  files,
  rules: { 'no-restricted-imports': ['error', { patterns: patterns.map(group => ({ group: [group], message })) }] },
})

export default withNuxt(
  floor(['shared/**/*.ts'], ['~/**', '#server/**', 'vue', 'h3', 'nitropack/**', 'node:*'],
    'shared runs anywhere: no Vue, Nitro or Node here.'),
  floor(['shared/numeric/**/*.ts'], ['#shared/**', '**/analysis/**', '~/**', '#server/**', 'node:*'],
    'shared/numeric knows no domain word.'),
  floor(['shared/analysis/**/*.ts'], ['#shared/schemas/**', '#shared/plots/**', '#shared/importers/**', '#shared/workflow/**', '#shared/access/**', '~/**', '#server/**', 'node:*'],
    'shared/analysis knows no file, row or pixel.'),
  floor(['app/**/*.{ts,vue}'], ['#server/**', 'node:*'], 'app and server meet only in shared.'),
  floor(['server/**/*.ts'], ['~/**'], 'app and server meet only in shared.'),
  {
    files: ['server/**/*.ts'],
    ignores: ['server/database/database.ts'],
    rules: {
      'no-restricted-syntax': ['error', { selector: 'CallExpression[callee.property.name="transaction"]', message: 'writeTransaction is the one place where a transaction is begun.' }],
    },
  },
)
