import js from '@eslint/js';
import next from 'eslint-config-next/core-web-vitals';
import tseslint from 'typescript-eslint';

const envBan = {
  selector: "MemberExpression[object.name='process'][property.name='env']",
  message: 'Read settings through lib/config/env.ts.',
};
const defaultBan = { selector: 'ExportDefaultDeclaration', message: 'Use a named export.' };
const enumBan = { selector: 'TSEnumDeclaration', message: 'Use a const table and a union.' };

const config = tseslint.config(
  { ignores: ['**/.next/**', '.wiretag/**', 'node_modules/**', 'next-env.d.ts', 'reports/**'] },
  js.configs.recommended,
  ...next,
  { rules: { '@next/next/no-html-link-for-pages': 'off', '@next/next/no-img-element': 'off' } },
  {
    files: ['**/*.ts', '**/*.tsx', '**/*.mts'],
    extends: [...tseslint.configs.strictTypeChecked, ...tseslint.configs.stylisticTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/consistent-type-imports': 'error',
      '@typescript-eslint/consistent-type-definitions': ['error', 'interface'],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
      '@typescript-eslint/no-confusing-void-expression': ['error', { ignoreArrowShorthand: true }],
      '@typescript-eslint/switch-exhaustiveness-check': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false } }],
      complexity: ['error', 10],
      'max-lines': ['error', { max: 250, skipBlankLines: true, skipComments: true }],
      'max-params': ['error', 4],
      'no-console': 'error',
      'no-restricted-syntax': ['error', envBan, defaultBan, enumBan],
      eqeqeq: 'error',
    },
  },
  {
    // Next.js asks for default exports in these files.
    files: [
      'app/**/{page,layout,loading,error,global-error,not-found,template,default,manifest,icon}.tsx',
      'app/**/*.ts',
    ],
    rules: { 'no-restricted-syntax': ['error', envBan, enumBan] },
  },
  {
    files: ['*.ts', '*.mts', '*.mjs', 'db/migrations/**', 'proxy.ts', 'instrumentation.ts'],
    rules: { 'no-restricted-syntax': ['error', enumBan] },
  },
  // The bare twin of the bench is a Next.js application of its own.
  { files: ['tests/bench/bare/**'], rules: { 'no-restricted-syntax': ['error', enumBan] } },
  // On a screen each condition is one more thing shown.
  { files: ['**/*.tsx'], rules: { complexity: ['error', 18] } },
  // A migration is SQL, kept whole.
  { files: ['db/migrations/**'], rules: { 'max-lines': 'off' } },
  { files: ['lib/config/env.ts'], rules: { 'no-restricted-syntax': ['error', defaultBan, enumBan] } },
  {
    files: ['tests/**', 'fake-services/**', 'lib/cli/**'],
    ignores: ['tests/bench/bare/**'],
    rules: { 'no-restricted-syntax': ['error', defaultBan, enumBan], 'no-console': 'off' },
  },
  {
    files: ['tests/**'],
    rules: {
      'max-params': 'off',
      'max-lines': ['error', { max: 400, skipBlankLines: true, skipComments: true }],
    },
  },
);
export default config;
