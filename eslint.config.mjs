import nextVitals from 'eslint-config-next/core-web-vitals'
import nextTypescript from 'eslint-config-next/typescript'
import tseslint from 'typescript-eslint'
import arrows from './lib/start/arrows.cjs'
import { daybreathPlugin } from './lib/start/eslint-rules.mjs'

const escape = (text) => text.replace(/[.]/g, '\\.')
const alias = (paths) => paths.map((path) => escape(path)).join('|')

/** One row of the table of import directions as lint patterns; the gate over resolved paths is .dependency-cruiser.cjs. */
function toLintConfig({ name, files, except, may, mayAsType = [], mayNot = [], packagesNot = [], packagesOnly }) {
  const patterns = [
    { regex: `^@/(?!${alias([...may, ...mayAsType]) || '$^'})`, message: `${name}: see the table of folders in DEVELOPERS.md.` },
  ]
  if (mayAsType.length > 0) {
    const regex = `^@/${may.length > 0 ? `(?!${alias(may)})` : ''}(?:${alias(mayAsType)})`
    patterns.push({ regex, allowTypeImports: true, message: `${name}: types only.` })
  }
  if (mayNot.length > 0)
    patterns.push({
      regex: `^@/(?:${mayNot.map((path) => escape(path.replace(/\.ts$/, ''))).join('|')})`,
      message: `${name}: not from here.`,
    })
  if (packagesNot.length > 0) {
    const names = packagesNot.map((packageName) => packageName.replace(/\/$|:$/, '')).join('|')
    patterns.push({ regex: `^(?:${names})(?:[/:]|$)`, message: `${name} stays free of this package.` })
  }
  if (packagesOnly) {
    const allowed = [...packagesOnly.map((packageName) => `${packageName}(?:/|$)`), '\\./', '@/'].join('|')
    patterns.push({ regex: `^(?!${allowed})`, message: `${name} stays pure.` })
  }
  return { files, ignores: except, rules: { '@typescript-eslint/no-restricted-imports': ['error', { patterns }] } }
}

const noBarrels = [
  { selector: 'ExportAllDeclaration', message: 'Import the exact file: no barrels.' },
  { selector: 'ExportDefaultDeclaration', message: 'Named exports; default only where Next asks for it.' },
]
const COLOUR =
  '(#[0-9a-fA-F]{3,8}\\b|\\b(text|bg|border|fill|stroke|ring|outline)-(red|green|blue|gr[ae]y|slate|zinc|amber|yellow|orange|teal|black|white)\\b)'
const coloursByToken = [
  { selector: `Literal[value=/${COLOUR}/]`, message: 'Colours only by token (text-stop, bg-paper …).' },
  { selector: `TemplateElement[value.raw=/${COLOUR}/]`, message: 'Colours only by token (text-stop, bg-paper …).' },
]
const noClock = [
  { selector: "NewExpression[callee.name='Date'][arguments.length=0]", message: 'Time comes in as an argument.' },
  { selector: "CallExpression[callee.name='Date']", message: 'Time comes in as an argument.' },
]
const length = (max) => ['error', { max, skipBlankLines: true, skipComments: true }]

export default tseslint.config(
  {
    ignores: [
      '.next*/**',
      'data/**',
      'db/migrations/**',
      'next-env.d.ts',
      'test-results/**',
      'playwright-report/**',
      'coverage/**',
    ],
  },
  ...nextVitals,
  ...nextTypescript,
  {
    files: ['**/*.{ts,tsx,mts}'],
    plugins: { '@typescript-eslint': tseslint.plugin, daybreath: daybreathPlugin },
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
      '@typescript-eslint/no-floating-promises': ['error', { checkThenables: true }],
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      '@typescript-eslint/await-thenable': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      'daybreath/no-waiting-transaction': 'error',
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-console': 'error',
      'max-lines': length(300),
      'max-lines-per-function': length(90),
    },
  },
  // A component is mostly markup.
  { files: ['**/*.tsx'], rules: { 'max-lines-per-function': length(150) } },
  {
    files: ['lib/**', 'components/**', 'db/**', 'jobs/**'],
    ignores: ['db/schema/index.ts'],
    rules: { 'no-restricted-syntax': ['error', ...noBarrels] },
  },
  { files: ['components/**'], rules: { 'no-restricted-syntax': ['error', ...noBarrels, ...coloursByToken] } },
  { files: ['app/**/*.tsx'], rules: { 'no-restricted-syntax': ['error', ...coloursByToken] } },
  {
    files: ['lib/weaning/**', 'lib/statistics/**'],
    rules: {
      'no-restricted-syntax': ['error', ...noBarrels, ...noClock],
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'Same input, same answer.' },
        { object: 'Date', property: 'now', message: 'Time comes in as an argument.' },
        { object: 'performance', property: 'now', message: 'Time comes in as an argument.' },
      ],
      'no-restricted-globals': [
        'error',
        'process',
        'globalThis',
        'window',
        'document',
        'fetch',
        'crypto',
        'setTimeout',
        'setInterval',
      ],
    },
  },
  {
    files: ['**/*.{ts,tsx}'],
    ignores: ['lib/weaning/**', 'lib/statistics/**', 'lib/server/env.ts', 'tests/**', 'instrumentation.ts', '*.config.ts'],
    rules: {
      'no-restricted-properties': [
        'error',
        { object: 'process', property: 'env', message: 'Settings are read in lib/server/env.ts.' },
      ],
    },
  },
  { files: ['lib/services/**'], rules: { 'daybreath/verb-has-door': 'error' } },
  {
    files: ['lib/services/**', 'lib/server/**', 'lib/access/door.ts', 'db/client.ts', 'db/queries/**'],
    rules: { 'daybreath/says-server-only': 'error' },
  },
  ...arrows.ARROWS.map(toLintConfig),
  // The scripts that start everything, the programs that people run, and the tests may speak to the console.
  {
    files: ['lib/start/**', 'jobs/run.ts', 'lib/server/boot.ts', 'tests/**', '*.{ts,mjs,mts,cjs}'],
    rules: { 'no-console': 'off' },
  },
  { files: ['**/*.cjs'], rules: { '@typescript-eslint/no-require-imports': 'off' } },
  { files: ['lib/start/**/*.mjs'], rules: { 'max-lines': length(300), 'max-lines-per-function': length(90) } },
  { files: ['tests/**'], rules: { 'max-lines': 'off', 'max-lines-per-function': 'off', 'no-restricted-syntax': 'off' } },
)
