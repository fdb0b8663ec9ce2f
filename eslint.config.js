import prettier from 'eslint-config-prettier'
import vue from 'eslint-plugin-vue'
import { defineConfig, globalIgnores } from 'eslint/config'
import typescript from 'typescript-eslint'

const code = ['**/*.{ts,mts,mjs,js,vue}']

/** What may never be imported in a room, with the reason. A dynamic import is an import. */
const walls = {
  shared: [
    {
      regex: '^(?!\\.{1,2}/|zod$|ml-matrix$)',
      message: 'shared/ is the pure core: it imports itself, zod and ml-matrix. Pass in whatever needs more.',
    },
    {
      regex: '^(\\.\\./)+(server|src|tests|examples)(/|$)',
      message: 'shared/ imports nothing above it: browser, server and command line all stand on it.',
    },
    { regex: '\\.json$', message: 'shared/ reads no files: the catalog is passed in.' },
  ],
  src: [
    {
      regex: '(^|/)server(/|$)',
      message: 'The browser never imports the server: they talk over HTTP, in the words of shared/contract.',
    },
    { regex: '^node:', message: 'There is no Node.js in the browser.' },
    {
      regex: '^(express|sequelize|pg|argon2|nodemailer|pino|umzug|jsonwebtoken)(/|$)',
      message: 'That package belongs to the server.',
    },
    { regex: '^(\\.\\./)+shared/', message: "Write '#shared/...': one way to name a thing." },
  ],
  server: [
    {
      regex: '^(\\.\\./)+src(/|$)',
      message: 'The server never imports the browser: what both need lives in shared/.',
    },
    {
      regex: '^(vue|pinia|primevue|@vue-flow|@vueuse|@tanstack)(/|$|-)',
      message: 'That package belongs to the browser.',
    },
    { regex: '^(\\.\\./)+shared/', message: "Write '#shared/...': one way to name a thing." },
  ],
}

/** @param {readonly { regex: string, message: string }[]} patterns */
const noImportsOf = (patterns) => [
  'error',
  { patterns: patterns.map((pattern) => ({ ...pattern, caseSensitive: true })) },
]

/** The same walls for `import('...')`, which the rule above does not see. */
const dynamicImportsOf = (patterns) =>
  patterns.map(({ regex, message }) => ({
    selector: `ImportExpression > Literal[value=/${regex.replaceAll('/', '\\/')}/]`,
    message,
  }))

const noEnvironment = [
  {
    selector: "MemberExpression[object.name='process'][property.name='env']",
    message: 'Settings are read in server/config.ts (and by set-up) alone; take them from there.',
  },
]
const noDefaultExport = [
  { selector: 'ExportDefaultDeclaration', message: 'Export by name: a thing has one name everywhere.' },
]
const noChance = [
  {
    selector: "MemberExpression[object.name='Math'][property.name='random']",
    message: 'shared/ knows no chance: pass the numbers in.',
  },
  {
    selector: "MemberExpression[object.name='Date'][property.name='now']",
    message: 'shared/ knows no clock: pass the time in.',
  },
  {
    selector: "NewExpression[callee.name='Date'][arguments.length=0]",
    message: 'shared/ knows no clock: pass the time in.',
  },
]
const noFocus = [
  {
    selector:
      'MemberExpression[object.name=/^(it|test|describe)$/][property.name=/^(only|skip|todo|skipIf|runIf|fails)$/]',
    message: 'Every test runs, always.',
  },
]

export default defineConfig(
  globalIgnores(['dist/', 'node_modules/', '.data/', 'coverage/']),
  { linterOptions: { noInlineConfig: true, reportUnusedDisableDirectives: 'error' } },
  { files: code, extends: [typescript.configs.strict] },
  { files: ['**/*.vue'], extends: [vue.configs['flat/recommended']] },
  {
    files: ['**/*.vue'],
    languageOptions: { parserOptions: { parser: typescript.parser } },
    rules: {
      'vue/block-lang': ['error', { script: { lang: 'ts' } }],
      'vue/component-api-style': ['error', ['script-setup']],
      'vue/block-order': ['error', { order: ['script', 'template', 'style'] }],
      'vue/no-v-html': 'error',
      'vue/require-default-prop': 'off',
    },
  },
  prettier,
  {
    files: code,
    rules: {
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-eval': 'error',
      'no-implied-eval': 'error',
      'no-new-func': 'error',
      'prefer-const': 'error',
      'object-shorthand': 'error',
      'no-restricted-syntax': ['error', ...noDefaultExport, ...noEnvironment],
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
      '@typescript-eslint/no-invalid-void-type': 'off',
      // With noUncheckedIndexedAccess this is how code says that an index is known to be there.
      '@typescript-eslint/no-non-null-assertion': 'off',
      // Documents, overrides and form errors are records keyed by the names of fields: taking a key out is an edit.
      '@typescript-eslint/no-dynamic-delete': 'off',
    },
  },
  {
    files: ['shared/**/*.ts'],
    rules: {
      'no-restricted-imports': noImportsOf(walls.shared),
      'no-restricted-globals': [
        'error',
        ...[
          'window',
          'document',
          'navigator',
          'fetch',
          'process',
          'console',
          'performance',
          'crypto',
          'setTimeout',
        ].map((name) => ({ name, message: 'shared/ is pure: it runs in every runtime and touches nothing outside.' })),
      ],
      'no-restricted-syntax': [
        'error',
        ...dynamicImportsOf(walls.shared),
        ...noDefaultExport,
        ...noEnvironment,
        ...noChance,
      ],
    },
  },
  {
    files: ['src/**/*.{ts,vue}'],
    rules: {
      'no-restricted-imports': noImportsOf(walls.src),
      'no-restricted-syntax': ['error', ...dynamicImportsOf(walls.src), ...noDefaultExport, ...noEnvironment],
    },
  },
  {
    files: ['server/**/*.{ts,mjs}'],
    rules: {
      'no-restricted-imports': noImportsOf(walls.server),
      'no-restricted-syntax': ['error', ...dynamicImportsOf(walls.server), ...noDefaultExport, ...noEnvironment],
    },
  },
  {
    files: ['tests/**/*.ts'],
    rules: {
      'no-restricted-syntax': ['error', ...noDefaultExport, ...noEnvironment, ...noFocus],
    },
  },
  {
    files: ['server/config.ts'],
    rules: { 'no-restricted-syntax': ['error', ...dynamicImportsOf(walls.server), ...noDefaultExport] },
  },
  {
    files: ['server/setup/**/*.mjs'],
    rules: { 'no-restricted-syntax': ['error', ...noDefaultExport] },
  },
  {
    // These are read by tools that want a default export.
    files: ['eslint.config.js', 'vite.config.ts'],
    rules: { 'no-restricted-syntax': ['error', ...noEnvironment] },
  },
)
