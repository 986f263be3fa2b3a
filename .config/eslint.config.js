import { defineConfig } from 'eslint/config'
import svelte from 'eslint-plugin-svelte'
import globals from 'globals'
import ts from 'typescript-eslint'
import svelteConfig from '../renderer/svelte.config.js'

const clockOnly = [
  { object: 'Date', property: 'now', message: 'Ask the Clock port for the time.' },
  { object: 'Math', property: 'random', message: 'Nothing here is left to chance; take a seed.' },
]

export default defineConfig(
  { ignores: ['dist/', 'node_modules/', 'test/**/cases/', 'test/reference/'] },
  ...ts.configs.recommended,
  ...svelte.configs.recommended,
  {
    files: ['**/*.ts', '**/*.svelte'],
    languageOptions: { globals: { ...globals.node, ...globals.browser } },
    rules: {
      eqeqeq: 'error',
      'func-style': ['error', 'declaration', { allowArrowFunctions: true }],
      // Stack traces have names: at the top level functions are declared.
      'no-restricted-syntax': [
        'error',
        ':matches(Program, ExportNamedDeclaration) > VariableDeclaration > VariableDeclarator[init.type="ArrowFunctionExpression"]',
      ],
      'max-lines': ['error', 500],
      'no-console': 'error',
      'no-undef': 'off',
      '@typescript-eslint/consistent-type-imports': ['error', { disallowTypeAnnotations: false }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
    },
  },
  {
    files: ['solver/**/*.ts', 'app/**/*.ts', 'db/**/*.ts'],
    languageOptions: { parserOptions: { projectService: true } },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      'no-restricted-properties': ['error', ...clockOnly],
    },
  },
  {
    files: ['**/*.svelte', '**/*.svelte.ts'],
    languageOptions: { parserOptions: { parser: ts.parser, extraFileExtensions: ['.svelte'], svelteConfig } },
    rules: {
      'svelte/button-has-type': 'error',
      'svelte/no-at-html-tags': 'error',
      // What comes from the core is held raw and replaced, never changed in place.
      'svelte/prefer-svelte-reactivity': 'off',
    },
  },
  {
    // Where the process meets the world: the only places with a clock and a console.
    files: ['app/shells/**/*.ts', 'test/**/*.ts'],
    rules: { 'no-console': 'off', 'no-restricted-properties': 'off' },
  },
)
