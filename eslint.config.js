import js from '@eslint/js';
import prettier from 'eslint-config-prettier';
import vue from 'eslint-plugin-vue';
import globals from 'globals';
import ts from 'typescript-eslint';

// In a flat configuration a later rule replaces an earlier one for the same file, so each folder has one entry that
// names everything it may not import, whichever way it imports it.
const forbid = (files, regex, message) => {
  const source = `[source.value=/${regex.replaceAll('/', '\\/')}/]`;
  return {
    files: [files],
    rules: {
      'no-restricted-imports': ['error', { patterns: [{ regex, message }] }],
      'no-restricted-syntax': ['error', { selector: `:matches(ImportExpression, TSImportType)${source}`, message }],
    },
  };
};
const above = (...folders) => `^(\\.\\./)+(${folders.join('|')})(/|\\.|$)`;
const elsewhere = ['seeds', 'migrations', 'scripts', 'tests'];
const packagesBut = (...pure) => `^(?!\\.|(${pure.join('|')})(/|$))`;

const neverInShared = ['window', 'document', 'process', 'fetch', 'console', 'performance', 'crypto', 'Date', 'Buffer'];
const clocks = ['setTimeout', 'setInterval', 'setImmediate', 'queueMicrotask'];

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
  forbid(
    'shared/**',
    `${above('server', 'src', ...elsewhere)}|${packagesBut('js-yaml', '@stdlib')}`,
    'shared/ is pure: it knows neither server nor browser, and only packages that calculate',
  ),
  forbid('src/**', above('server', ...elsewhere), 'the browser reaches the server through src/api'),
  forbid(
    'src/api/**',
    above(
      'server',
      'seeds',
      'migrations',
      'scripts',
      'tests',
      'pages',
      'components',
      'composables',
      'stores',
      'layouts',
    ),
    'src/api knows the server, nothing of the screen',
  ),
  forbid(
    'src/components/**',
    above('server', ...elsewhere, 'pages', 'layouts'),
    'components know nothing of the page that shows them, and reach the server through src/api',
  ),
  forbid('server/**', above('src', 'tests'), 'the server knows nothing of the browser'),
  forbid('server/routes/**', above('src', 'tests', 'repositories', 'db', 'migrations'), 'routes call services'),
  forbid('server/services/**', above('src', 'tests', 'routes', 'middleware'), 'services know nothing of HTTP'),
  forbid(
    'server/middleware/**',
    above('src', 'tests', 'routes', 'repositories', 'db'),
    'routes know middleware, not it them',
  ),
  forbid(
    'server/repositories/**',
    above('src', 'tests', 'services', 'routes', 'middleware', 'replay-queue'),
    'repositories hold SQL only',
  ),
  {
    files: ['shared/**'],
    rules: {
      'no-restricted-globals': ['error', ...neverInShared, ...clocks],
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'randomness is an argument' },
      ],
    },
  },
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
