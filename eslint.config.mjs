import js from '@eslint/js';
import { defineConfig } from 'eslint/config';
import tseslint from 'typescript-eslint';

export default defineConfig(
  { ignores: ['dist/', 'test-output/', '.cache/'] },
  js.configs.recommended,
  {
    files: ['**/*.ts'],
    extends: [tseslint.configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { project: './tsconfig.json', tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/explicit-module-boundary-types': 'error',
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      'no-console': 'error',
      // Tables of nodes and coefficients keep the digits of their source.
      'no-loss-of-precision': 'off',
      // Hooks are plain functions; no method of ours is handed on without its object.
      '@typescript-eslint/unbound-method': 'off',
    },
  },
  { files: ['test/**'], rules: { 'no-console': 'off' } },
  { files: ['test/editor/inPage.js'], languageOptions: { globals: { document: 'readonly', NodeFilter: 'readonly' } } },
  { files: ['scripts/**'], rules: { 'no-console': 'off' }, languageOptions: { globals: { process: 'readonly', console: 'readonly' } } },
);
