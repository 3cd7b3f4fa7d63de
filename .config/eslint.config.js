import tseslint from 'typescript-eslint'
import vue from 'eslint-plugin-vue'
import vueParser from 'vue-eslint-parser'

/** @param {string[]} files @param {...object} patterns */
const limit = (files, ...patterns) => ({ files, rules: { 'no-restricted-imports': ['error', { patterns }] } })

const noServer = { regex: '^(#server/|node:)', message: 'The client reaches the server through contracts only.' }
const noPages = { group: ['@/views/*', '@/queries/*', '@/api/*', '@/router'], message: 'A component gets props and emits events.' }
const noHttp = { group: ['express', '**/routes/*', '**/middleware/*'], message: 'Services and policies do not know HTTP.' }
const pureShared = { regex: '^(#server/|@/|node:|vue$|express$)', message: 'shared/ runs anywhere.' }
const engineOnly = { regex: '^(?!\\.{1,2}/|#shared/(engine|units)|vitest$|fast-check$)', message: 'The engine imports itself and units.' }
const drawingOnly = { regex: '^(?!\\.{1,2}/|#shared/(engine|units|drawing)|qrcode-generator$|jsqr$|vitest$|fast-check$)', message: 'The drawing imports the engine, units and itself, and the module matrix of a code.' }
const plainOnly = { regex: '^(?!\\.{1,2}/|#shared/(units|shown-units|number-text|number-format|money|workflow|measurement|costing)|decimal\\.js$|vitest$|fast-check$)', message: 'workflow, measurement and costing import units and decimals only.' }

// `regex`, not `group`, where a pattern starts with #: group patterns are gitignore lines.
// A later block replaces the same rule of an earlier one, so each block repeats what it keeps.
export default tseslint.config(
  { ignores: ['**/dist/**', '**/node_modules/**', 'migrations/**', 'data/**', '.pictures/**'] },
  ...vue.configs['flat/essential'],
  { files: ['**/*.ts'], languageOptions: { parser: tseslint.parser }, plugins: { '@typescript-eslint': tseslint.plugin } },
  { files: ['**/*.vue'], languageOptions: { parser: vueParser, parserOptions: { parser: tseslint.parser } }, plugins: { '@typescript-eslint': tseslint.plugin } },
  {
    files: ['**/*.ts', '**/*.vue'],
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/consistent-type-imports': 'error',
      'prefer-const': 'error',
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'vue/multi-word-component-names': 'off',
      'vue/no-undef-components': ['error', { ignorePatterns: ['RouterLink', 'RouterView'] }],
    },
  },
  limit(['shared/**/*.ts'], pureShared),
  limit(['shared/engine/**/*.ts'], pureShared, engineOnly),
  limit(['shared/drawing/**/*.ts'], pureShared, drawingOnly),
  limit(['shared/workflow/**/*.ts', 'shared/measurement/**/*.ts', 'shared/costing/**/*.ts'], pureShared, plainOnly),
  limit(['client/src/**/*.{ts,vue}'], noServer),
  limit(['client/src/components/**/*.{ts,vue}'], noServer, noPages),
  limit(['server/services/**', 'server/policies/**'], noHttp),
)
