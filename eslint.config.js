import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import vue from 'eslint-plugin-vue';
import globals from 'globals';
import ts from 'typescript-eslint';

// In a flat configuration a later no-restricted-imports replaces an earlier one for the same file,
// so each folder has one entry that names everything it may not import.
const forbid = (files, folders, message) => ({
  files: [files],
  rules: { 'no-restricted-imports': ['error', { patterns: [{ regex: `^(\\.\\./)+(${folders})(/|\\.|$)`, message }] }] },
});

export default ts.config(
  { ignores: ['dist/**', '.quasar/**', 'node_modules/**', 'coverage/**', 'var/**', 'shared/model/**'] },
  js.configs.recommended,
  ...ts.configs.recommendedTypeChecked,
  ...vue.configs['flat/recommended'],
  {
    languageOptions: {
      globals: { ...globals.browser, ...globals.node },
      parserOptions: {
        parser: ts.parser,
        project: ['./tsconfig.json', './tsconfig.node.json'],
        extraFileExtensions: ['.vue'],
        tsconfigRootDir: import.meta.dirname,
      },
    },
    rules: {
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      'vue/multi-word-component-names': 'off',
      'vue/require-default-prop': 'off', // a typed optional prop says that it may be absent
    },
  },
  forbid('shared/**', 'server|src', 'shared/ is pure: it knows neither server nor browser'),
  forbid('src/**', 'server', 'the browser reaches the server through src/api'),
  forbid('server/routes/**', 'repositories|db', 'routes call services'),
  forbid('server/services/**', 'routes|middleware', 'services know nothing of HTTP'),
  forbid('server/repositories/**', 'services|routes|middleware', 'repositories hold SQL only'),
  { files: ['shared/**'], rules: { 'no-restricted-globals': ['error', 'window', 'document', 'process', 'fetch'] } },
  { files: ['**/*.js', '**/*.mjs', 'quasar.config.ts'], ...ts.configs.disableTypeChecked },
  {
    files: ['tests/**'],
    rules: {
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
    },
  },
  prettier,
);
