import withNuxt from './.nuxt/eslint.config.mjs'

/** Refuses imports that would break a wall of the house (DEVELOPERS.md, Walls). */
const wall = (patterns) => ({ 'no-restricted-imports': ['error', { patterns }] })
const forbid = (group, message) => ({ group, message })

const OUTSIDE_ENGINE = [
  '#*',
  '~/**',
  '@/**',
  'node:*',
  'vue',
  'vue/**',
  'nuxt',
  'nuxt/**',
  'h3',
  'zod',
  'drizzle-orm',
  'drizzle-orm/**',
  'fflate',
]

const HOUSE_OUTSIDE_ENGINE = ['**/schemas/**', '**/errors', '**/server/**', '**/packed-arrays']

/** The one file of the engine that knows a package: DEFLATE is not written anew. */
const ENGINE_ARCHIVE = 'shared/engine/formats/archive.ts'

export default withNuxt(
  { ignores: ['server/database/migrations/**', '.output/**', '.data*/**', 'coverage/**', 'screens/**'] },
  {
    rules: {
      'max-lines-per-function': ['error', { max: 60, skipBlankLines: true, skipComments: true }],
      'vue/max-attributes-per-line': 'off',
      'vue/html-self-closing': 'off',
      'vue/singleline-html-element-content-newline': 'off',
      'vue/html-indent': 'off',
      'vue/html-closing-bracket-newline': 'off',
      'vue/multi-word-component-names': 'off',
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_', ignoreRestSiblings: true },
      ],
    },
  },
  {
    files: ['shared/engine/**/*.ts'],
    rules: {
      ...wall([forbid([...OUTSIDE_ENGINE, ...HOUSE_OUTSIDE_ENGINE], 'The engine imports nothing outside itself.')]),
      'no-restricted-globals': [
        'error',
        'Date',
        'performance',
        'process',
        'window',
        'document',
        'console',
        'fetch',
        'setTimeout',
      ],
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'Randomness is passed in: shared/engine/random.ts.' },
      ],
      'max-lines-per-function': ['error', { max: 80, skipBlankLines: true, skipComments: true }],
    },
  },
  {
    files: [ENGINE_ARCHIVE],
    rules: wall([
      forbid(
        [...OUTSIDE_ENGINE.filter((name) => name !== 'fflate'), ...HOUSE_OUTSIDE_ENGINE],
        'Beside its package for DEFLATE this file imports nothing outside the engine.',
      ),
    ]),
  },
  {
    files: ['shared/**/*.ts'],
    ignores: ['shared/engine/**'],
    rules: wall([
      forbid(['**/server/**', 'drizzle-orm', 'drizzle-orm/**', 'node:*'], 'What is shared knows no server.'),
    ]),
  },
  {
    files: [
      'pages/**',
      'components/**',
      'layouts/**',
      'composables/**',
      'stores/**',
      'utils/**',
      'middleware/**',
      'plugins/**',
    ],
    rules: wall([
      forbid(['**/server/**', 'drizzle-orm', 'drizzle-orm/**', 'node:*'], 'Pages never import from the server.'),
    ]),
  },
  {
    files: ['pages/**', 'components/**', 'layouts/**'],
    rules: {
      'no-restricted-globals': [
        'error',
        { name: '$fetch', message: 'All client HTTP lives in composables.' },
        { name: 'fetch', message: 'All client HTTP lives in composables.' },
      ],
    },
  },
  {
    files: ['server/api/**/*.ts'],
    rules: {
      ...wall([
        forbid(['**/database/**', 'drizzle-orm', 'drizzle-orm/**'], 'Routes call services, never repositories.'),
      ]),
      'max-lines': ['error', 60],
    },
  },
  {
    files: [
      'server/services/**/*.ts',
      'server/bundle/**/*.ts',
      'server/jobs/**/*.ts',
      'server/database/**/*.ts',
      'server/workers/**/*.ts',
    ],
    rules: wall([forbid(['h3', '**/api/**', '**/utils/**', '#imports', '#app'], 'Services and below know no HTTP.')]),
  },
  {
    files: ['server/workers/tasks/**/*.ts', 'server/workers/thread.ts', 'server/bundle/**/*.ts'],
    rules: wall([
      forbid(['**/database/**', '**/services/**', 'drizzle-orm', 'drizzle-orm/**'], 'A thread knows no database.'),
    ]),
  },
  {
    files: ['tests/**', 'bench/**', 'scripts/**', 'modules/**', '*.config.*'],
    rules: { 'max-lines-per-function': 'off' },
  },
)
