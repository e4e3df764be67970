// @ts-check
import withNuxt from './.nuxt/eslint.config.mjs'

/**
 * Who may import whom, as far as one import says it by itself; tests/meta/architecture.test.ts follows every import
 * to its file and holds the whole table.
 *
 * @param {string} name
 * @param {string[]} files
 * @param {{ regex: string, message: string }[]} patterns
 */
const mayNotImport = (name, files, patterns) => ({
  name: `hartroll/imports/${name}`,
  files,
  rules: { 'no-restricted-imports': /** @type {['error', { patterns: typeof patterns }]} */ (['error', { patterns }]) },
})

const NO_TESTS = { regex: '(^|/)tests/', message: 'Nothing imports tests.' }
const NO_SERVER = { regex: '^(~|~~|@|@@)?/?(\\.\\./)*(server|db|seeds|scripts)/', message: 'What runs in the browser never imports server or db: it would be shipped to everybody.' }
const NO_DRIVERS = { regex: '^(knex|mysql2)(/|$)', message: 'Only repositories, read-models and db/ speak to the database.' }
const NO_H3 = { regex: '^(h3|nitropack|#imports|nuxt)(/|$)', message: 'A service knows nothing of requests: take what it needs as an argument.' }
const NO_TABLES = { regex: '(^|/)(repositories|db)/', message: 'Routes call services, read-models and presenters.' }

export default withNuxt(
  {
    name: 'hartroll/ignores',
    ignores: ['.cache/**', '.data/**', 'reports/**', 'coverage/**', 'db/tables.d.ts'],
  },
  {
    name: 'hartroll/rules',
    rules: {
      '@stylistic/arrow-parens': 'off',
      '@stylistic/max-statements-per-line': 'off',
      '@stylistic/multiline-ternary': 'off',
      '@stylistic/quote-props': ['error', 'as-needed'],
      'no-console': ['error', { allow: ['warn'] }],
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'vue/multi-word-component-names': 'off',
      'vue/no-v-html': 'error',
    },
  },
  {
    name: 'hartroll/typescript',
    files: ['**/*.{ts,mts,vue}'],
    rules: {
      '@typescript-eslint/consistent-type-imports': ['error', { disallowTypeAnnotations: false }],
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true }],
      '@typescript-eslint/ban-ts-comment': ['error', { 'ts-expect-error': 'allow-with-description', 'ts-ignore': true, 'ts-nocheck': true, minimumDescriptionLength: 10 }],
    },
  },
  mayNotImport('everything', ['**/*.{ts,mts,mjs,vue}'], [NO_TESTS]),
  {
    name: 'hartroll/imports/tests',
    files: ['tests/**', 'scripts/**', 'stryker.config.mjs', 'vitest.config.ts'],
    rules: { 'no-restricted-imports': 'off', 'no-console': 'off' },
  },
  mayNotImport('domain', ['shared/domain/**'], [NO_TESTS, { regex: '^(?!\\.{1,2}/|#shared/domain/)', message: 'The domain imports nothing but itself.' }]),
  mayNotImport('schemas', ['shared/schemas/**'], [NO_TESTS, { regex: '^(?!\\.{1,2}/|#shared/|zod$)', message: 'Schemas import the domain and zod.' }]),
  mayNotImport('base', ['components/base/**'], [NO_TESTS, NO_SERVER, { regex: '^(~|~~|@|@@|#shared)/', message: 'Base components know nothing of ours.' }]),
  mayNotImport('browser', ['app.vue', 'error.vue', '{pages,layouts,components,composables,stores,middleware,plugins,utils}/**'], [NO_TESTS, NO_SERVER, NO_DRIVERS]),
  mayNotImport('routes', ['server/{api,routes}/**'], [NO_TESTS, NO_DRIVERS, NO_TABLES]),
  mayNotImport('services', ['server/services/**'], [NO_TESTS, NO_H3]),
  mayNotImport('tables', ['server/{repositories,read-models}/**'], [NO_TESTS, NO_H3, { regex: '(^|/)services/', message: 'SQL does not call use cases.' }]),
  mayNotImport('migrations', ['db/migrations/**'], [NO_TESTS, { regex: '^(?!\\./|\\.\\./columns|knex$)', message: 'A migration is one statement and small helpers; application code changes, a migration never does.' }]),
  {
    name: 'hartroll/domain',
    files: ['shared/domain/**'],
    rules: {
      'no-restricted-globals': ['error', 'process', 'window', 'document', 'fetch', 'crypto', 'performance'],
      'no-restricted-properties': ['error',
        { object: 'Date', property: 'now', message: 'The domain is told the time.' },
        { object: 'Math', property: 'random', message: 'The domain is given what is random.' },
      ],
      'no-restricted-syntax': ['error', { selector: 'NewExpression[callee.name="Date"][arguments.length=0]', message: 'The domain is told the time.' }],
    },
  },
  {
    name: 'hartroll/clock',
    files: ['server/{repositories,read-models,services}/**', 'db/**'],
    rules: {
      'no-restricted-syntax': ['error',
        { selector: 'Literal[value=/\\b(NOW|CURRENT_TIMESTAMP|SYSDATE|CURDATE|UTC_TIMESTAMP)\\s*\\(/i]', message: 'SQL never asks for the time: take it from the registry\'s clock.' },
        { selector: 'TemplateElement[value.raw=/\\b(NOW|CURRENT_TIMESTAMP|SYSDATE|CURDATE|UTC_TIMESTAMP)\\s*\\(/i]', message: 'SQL never asks for the time: take it from the registry\'s clock.' },
      ],
    },
  },
)
