import js from '@eslint/js'
import prettier from 'eslint-config-prettier'
import vue from 'eslint-plugin-vue'
import globals from 'globals'
import tseslint from 'typescript-eslint'

/*
 * Which room may import which (see DEVELOPERS.md). ESLint keeps only the last setting of a rule for a file, so each
 * room names everything it must not reach in one place.
 */
const path = (pattern, message) => ({ regex: pattern, message })
const room = (name) => `(^|/)${name}/`

const noTests = path(`${room('tests')}|${room('fake-services')}`, 'Nothing imports tests/ or fake-services/.')
const noServer = path(`${room('server')}|^@server/`, 'The client never imports the server: use shared/.')
const noClient = path(
  `${room('src')}|^@/|\\.vue$|^(vue|vue-router|pinia|primevue|@pinia/.*|@primeuix/.*)(/|$)`,
  'This room never imports the client or its libraries: use shared/.',
)
const noExpress = path(
  '^(express|express-session|passport|multer)(/|$)',
  'HTTP belongs to routes/ and middleware/.',
)
const noTypeorm = path('^typeorm(/|$)', 'The database belongs to entities/, queries/ and services/.')
const noEntities = path(
  room('entities'),
  'Entities are for services/ and queries/; elsewhere at most their types.',
)
const noDataSource = path('/dataSource\\.ts$', 'The data source belongs to queries/ and services/.')
const noQueries = path(room('queries'), 'This room works on what it is given; it does not ask the database.')
const noPresenters = path(
  room('presenters'),
  'Only routes/ turns rows into JSON: throw what happened and present it there.',
)
const noServices = path(room('services'), 'This room does not call services/.')
const noRoutes = path(
  `${room('routes')}|${room('middleware')}`,
  'Only app.ts puts routes and middleware together.',
)
const noViews = path(room('views'), 'Views are joined to addresses by the router only.')
const noApi = path(room('api'), 'A component gets its data as props; composables and stores call api/.')
const noStores = path(room('stores'), 'This room does not use stores.')
const noComposables = path(room('composables'), 'A composable may use a store, not the reverse.')
const noMarkup = path(`${room('components')}|${room('views')}|\\.vue$`, 'Markup is not imported from here.')
const onlyPure = path(
  '^(?!\\.{1,2}/|(yup|date-fns|syllable|flesch|flesch-kincaid)(/|$)|@zxcvbn-ts/)',
  'shared/ is pure: only yup, date-fns, small pure libraries and other files of shared/.',
)
const noOurs = path(`${room('src')}|${room('server')}|${room('shared')}|^@`, 'A fake stands alone.')
const onlyInside = path(
  `${room('src')}|${room('server')}`,
  'shared/ imports neither the client nor the server.',
)
// Types cost nothing at run time, so an entity's or a policy's shape may be named where its code may not be run.
const asType = (pattern) => ({ ...pattern, allowTypeImports: true })

const forbid = (files, patterns) => ({
  files,
  rules: {
    '@typescript-eslint/no-restricted-imports': ['error', { patterns: [noTests, ...patterns] }],
  },
})

const clockRules = [
  {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'Time comes from the injected clock (server/clock.ts) or as an argument.',
  },
  {
    selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
    message: 'Time comes from the injected clock (server/clock.ts) or as an argument.',
  },
]

export default tseslint.config(
  { ignores: ['node_modules', 'dist', 'dist-server', '.data'] },
  { linterOptions: { reportUnusedDisableDirectives: 'error' } },
  js.configs.recommended,
  ...tseslint.configs.recommended,
  ...vue.configs['flat/recommended'],
  {
    files: ['**/*.vue'],
    languageOptions: { parserOptions: { parser: tseslint.parser } },
  },
  {
    languageOptions: { ecmaVersion: 2023, sourceType: 'module', globals: { ...globals.node } },
    rules: {
      eqeqeq: ['error', 'always'],
      'no-eval': 'error',
      'no-implied-eval': 'error',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/ban-ts-comment': ['error', { 'ts-expect-error': 'allow-with-description' }],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
    },
  },
  {
    files: ['src/**/*.{ts,vue}'],
    languageOptions: { globals: { ...globals.browser } },
    rules: {
      'no-console': 'error',
      'vue/no-v-html': 'error',
      'vue/block-lang': ['error', { script: { lang: 'ts' } }],
      'vue/block-order': ['error', { order: ['script', 'template', 'style'] }],
      'vue/component-api-style': ['error', ['script-setup']],
      'vue/define-macros-order': 'error',
      'vue/require-typed-ref': 'error',
      'vue/require-default-prop': 'off',
      // The content-security policy refuses style attributes in markup; bound styles are set by script and pass.
      'vue/no-static-inline-styles': ['error', { allowBinding: true }],
    },
  },
  {
    files: ['src/**/*.{ts,vue}'],
    ignores: ['src/api/http.ts'],
    rules: {
      'no-restricted-globals': [
        'error',
        { name: 'fetch', message: 'The one HTTP client is src/api/http.ts.' },
      ],
    },
  },
  {
    // A promise nobody waits for is a write or an audit entry that may be lost without a word.
    files: ['server/**/*.ts', 'fake-services/**/*.ts', 'tests/server/**/*.ts', 'tests/support/**/*.ts'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-floating-promises': [
        'error',
        {
          allowForKnownSafeCalls: [{ from: 'package', name: ['it', 'describe', 'test'], package: 'vitest' }],
        },
      ],
      '@typescript-eslint/await-thenable': 'error',
    },
  },
  {
    files: [
      'shared/**/*.ts',
      'server/{services,queries,policies,presenters,routes,middleware,mail,uploads,seeds}/**/*.ts',
    ],
    rules: { 'no-restricted-syntax': ['error', ...clockRules] },
  },

  forbid(['src/**/*.{ts,vue}'], [noServer]),
  forbid(['src/components/**/*.{ts,vue}'], [noServer, noViews, noApi]),
  forbid(['src/stores/**/*.ts'], [noServer, noComposables, noMarkup]),
  forbid(['src/composables/**/*.ts'], [noServer, noMarkup]),
  forbid(['src/api/**/*.ts'], [noServer, noComposables, noStores, noMarkup]),
  forbid(['server/**/*.ts'], [noClient]),
  forbid(['server/routes/**/*.ts'], [noClient, asType(noEntities), noTypeorm, noDataSource]),
  forbid(['server/middleware/**/*.ts'], [noClient, asType(noEntities), noTypeorm, noDataSource]),
  forbid(['server/services/**/*.ts'], [noClient, noExpress, noRoutes, noPresenters]),
  forbid(['server/queries/**/*.ts'], [noClient, noExpress, noRoutes, noPresenters, noServices]),
  forbid(
    ['server/policies/**/*.ts'],
    [noClient, noExpress, noRoutes, noTypeorm, noDataSource, noQueries, noServices, asType(noEntities)],
  ),
  forbid(
    ['server/presenters/**/*.ts'],
    [
      noClient,
      noExpress,
      noRoutes,
      noTypeorm,
      noDataSource,
      noServices,
      asType(noQueries),
      asType(noEntities),
    ],
  ),
  forbid(
    ['server/{access,mail,pdf,uploads}/**/*.ts'],
    [noClient, noRoutes, noTypeorm, noDataSource, noQueries, noServices, noPresenters, noEntities],
  ),
  forbid(['server/entities/**/*.ts'], [noClient, noExpress, noRoutes, noServices, noDataSource]),
  forbid(['shared/**/*.ts'], [onlyPure, onlyInside]),
  {
    files: ['fake-services/**/*.ts'],
    rules: { '@typescript-eslint/no-restricted-imports': ['error', { patterns: [noOurs] }] },
  },
  prettier,
)
