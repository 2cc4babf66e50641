import vue from 'eslint-plugin-vue'
import tseslint from 'typescript-eslint'
import { lawOfImports } from './eslint/law-of-imports.js'

/**
 * No `as` outside decoders, no `any`, no non-null `!`: a value is narrowed by a check or it is not trusted.
 *
 * @type {import('eslint').Linter.RulesRecord}
 */
const strictTypes = {
  '@typescript-eslint/no-explicit-any': 'error',
  '@typescript-eslint/no-non-null-assertion': 'error',
  '@typescript-eslint/consistent-type-assertions': ['error', { assertionStyle: 'never' }],
  '@typescript-eslint/consistent-type-imports': 'error',
}

export default tseslint.config(
  { ignores: ['**/node_modules/', '**/dist/', '**/release/', 'out/', '**/.*/**', 'core/kernel/assembly/'] },
  { linterOptions: { reportUnusedDisableDirectives: 'error' } },
  ...tseslint.configs.recommended,
  ...vue.configs['flat/recommended-error'],
  {
    files: ['**/*.vue'],
    languageOptions: { parserOptions: { parser: tseslint.parser } },
    rules: {
      // Prettier owns layout.
      'vue/max-attributes-per-line': 'off',
      'vue/html-indent': 'off',
      'vue/singleline-html-element-content-newline': 'off',
      'vue/multiline-html-element-content-newline': 'off',
      'vue/html-self-closing': 'off',
      'vue/html-closing-bracket-newline': 'off',
      'vue/multi-word-component-names': 'off',
      'vue/block-lang': ['error', { script: { lang: 'ts' } }],
      'vue/component-api-style': ['error', ['script-setup']],
    },
  },
  {
    files: ['core/**/*.ts', 'app/**/*.ts', 'renderer/**/*.{ts,vue}'],
    plugins: { house: { rules: { 'law-of-imports': lawOfImports } } },
    rules: {
      ...strictTypes,
      'house/law-of-imports': 'error',
      'no-restricted-syntax': [
        'error',
        { selector: 'ExportDefaultDeclaration', message: 'Named exports only.' },
        { selector: 'ExportAllDeclaration', message: 'Name what is exported: an index is a public list.' },
      ],
      'max-lines': ['error', { max: 400 }],
      'no-console': 'error',
      eqeqeq: 'error',
    },
  },
  { files: ['app/batch.ts', 'app/serve.ts'], rules: { 'no-console': 'off' } },
  {
    // A decoder is where unknown data becomes typed: the one place a cast may stand, after the check.
    files: ['**/decode*.ts', '**/*Decoder.ts'],
    rules: { '@typescript-eslint/consistent-type-assertions': 'off' },
  },
  { files: ['core/**/*.ts'], rules: { 'no-restricted-globals': ['error', 'Date', 'performance', 'setTimeout'] } },
)
