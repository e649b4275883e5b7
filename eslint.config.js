import js from '@eslint/js'
import prettier from 'eslint-config-prettier'
import importX, { createNodeResolver } from 'eslint-plugin-import-x'
import vue from 'eslint-plugin-vue'
import globals from 'globals'
import tseslint from 'typescript-eslint'
import vueParser from 'vue-eslint-parser'

/** A wall: files matching `files` may not import what `patterns` match. */
const wall = (files, patterns, message, ignores = []) => ({
  files,
  ignores,
  rules: { 'no-restricted-imports': ['error', { patterns: [{ regex: patterns, message }] }] },
})

export default tseslint.config(
  { ignores: ['dist', 'node_modules', '.tierlight', 'coverage', 'test-results', 'playwright-report'] },
  js.configs.recommended,
  ...tseslint.configs.recommended,
  ...vue.configs['flat/recommended'],
  {
    files: ['**/*.vue'],
    languageOptions: { parser: vueParser, parserOptions: { parser: tseslint.parser, sourceType: 'module' } },
    rules: { 'vue/multi-word-component-names': 'off', 'vue/block-lang': ['error', { script: { lang: 'ts' } }] },
  },
  {
    files: ['src/**', 'tests/client/**'],
    languageOptions: { globals: { ...globals.browser } },
  },
  {
    files: ['server/**', 'cli/**', 'bench/**', 'examples/**', 'docs/**', 'tests/**', '*.config.*'],
    languageOptions: { globals: { ...globals.node } },
  },
  {
    plugins: { 'import-x': importX },
    settings: {
      'import-x/extensions': ['.ts', '.js'],
      'import-x/ignore': [String.raw`\.vue$`],
      'import-x/parsers': { '@typescript-eslint/parser': ['.ts'] },
      'import-x/resolver-next': [
        createNodeResolver({ extensions: ['.ts', '.vue', '.js'], extensionAlias: { '.js': ['.ts', '.js'] } }),
      ],
    },
    rules: {
      'import-x/no-cycle': 'error',
      'no-console': 'error',
      eqeqeq: ['error', 'always'],
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
    },
  },
  {
    files: ['cli/**', 'bench/**', 'examples/**', 'server/setup/**', 'tests/support/**'],
    rules: { 'no-console': 'off' },
  },

  // One direction only. `shared` imports neither side; the engine imports only data and itself.
  wall(
    ['shared/physics/**/*.ts'],
    '^(?!\\.{1,2}/|yalps$)|/contract/|/server/|/src/',
    'The engine is pure: it imports only itself, shared/data and the linear programme solver yalps.',
  ),
  wall(['shared/data/**/*.ts'], '^(?!\\.{1,2}/)|/contract/|/server/|/src/|/physics/', 'Data import nothing.'),
  wall(['shared/contract/**/*.ts'], '^(?!\\.{1,2}/|zod$)|/server/|/src/|/physics/', 'The contract imports only zod.'),
  wall(
    ['src/**/*.{ts,vue}'],
    '/server/|^node:',
    'The client reaches the server only through src/api and the contract.',
  ),
  wall(
    ['src/views/**', 'src/components/**', 'src/charts/**', 'src/layouts/**'],
    '/server/|^node:|/api/',
    'Views and components use composables, not the api.',
  ),
  wall(['server/**/*.ts'], '/src/|^typeorm$|^mysql2', 'Only server/database imports the ORM.', ['server/database/**']),
  wall(
    ['server/routes/**/*.ts'],
    '/src/|^typeorm$|^mysql2|/database/',
    'Routes talk to services, not to the database.',
  ),
  wall(['server/database/**/*.ts'], '/src/|/services/|/routes/', 'The database layer knows nothing above it.'),
  wall(
    ['server/services/**/*.ts'],
    '/src/|^typeorm$|^mysql2|/routes/|^express$',
    'Services know neither HTTP nor the ORM.',
  ),
  prettier,
)
