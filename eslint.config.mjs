import reactHooks from 'eslint-plugin-react-hooks';
import a11y from 'eslint-plugin-react-native-a11y';
import tseslint from 'typescript-eslint';
import screenRules from './docker-free-scripts/lint/screen-rules.mjs';

const browser = ['app/**/*.{ts,tsx}', 'components/**/*.{ts,tsx}'];
const server = ['server/**/*.ts'];
const shared = ['shared/**/*.ts'];
const tests = ['tests/**/*.{ts,tsx}'];
const scripts = ['**/*.{js,mjs,cjs}'];

/** Imports of a folder of the checkout, by alias or by climbing out of one's own. */
const folder = (...names) => `^(@/|(\\.\\./)+)(${names.join('|')})(/|$)`;

const forbidImports = (...patterns) => ({
  'no-restricted-imports': ['error', { patterns: patterns.map(([regex, message]) => ({ regex, message })) }],
});

const serverOnly = ['^(class-validator|class-transformer|class-validator-jsonschema|typeorm|express|pg|graphile-worker|stripe|pino|reflect-metadata)(/|$)|^node:',
  'This belongs to the server and must not reach the browser; import the interfaces of @shared/api instead.'];

const globalManager = ['manager', 'getRepository', 'getTreeRepository', 'createQueryBuilder', 'createEntityManager', 'transaction'].join('|');
const useUnitOfWork = 'The global manager is outside every unit of work and every school. Take the EntityManager that withSchool, withAccount or withSystem hands down.';

const pure = 'shared/ is pure: pass the time or the random source in.';

export default tseslint.config(
  { ignores: ['node_modules', 'dist', 'dist-server', '.expo', '.trayward', 'test-results', 'coverage', 'expo-env.d.ts'] },
  {
    files: ['**/*.{ts,tsx}'],
    extends: [tseslint.configs.strictTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    linterOptions: { reportUnusedDisableDirectives: 'error' },
    rules: {
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'max-lines-per-function': ['error', { max: 70, skipBlankLines: true, skipComments: true }],
      '@typescript-eslint/no-confusing-void-expression': ['error', { ignoreArrowShorthand: true }],
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      // Entities and DTOs are classes that hold nothing but decorated fields.
      '@typescript-eslint/no-extraneous-class': ['error', { allowWithDecorator: true }],
      // A function that implements an asynchronous port is async even where it has nothing to wait for: what it throws must reject.
      '@typescript-eslint/require-await': 'off',
      // An event handler may be async; what it throws is shown by the mutation it calls.
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { attributes: false, properties: false } }],
    },
  },
  {
    files: browser,
    extends: [reactHooks.configs.flat.recommended],
    plugins: { 'react-native-a11y': a11y, screen: screenRules },
    rules: {
      'no-console': 'error',
      ...forbidImports([folder('server', 'tests', 'docker-free-scripts'), 'The browser app may not import the server.'], serverOnly),
      'react-native-a11y/has-valid-accessibility-role': 'error',
      'react-native-a11y/has-valid-accessibility-state': 'error',
      'react-native-a11y/has-valid-accessibility-value': 'error',
      'react-native-a11y/has-valid-accessibility-actions': 'error',
      'react-native-a11y/has-valid-accessibility-live-region': 'error',
      'react-native-a11y/has-valid-important-for-accessibility': 'error',
      'react-native-a11y/no-nested-touchables': 'error',
      'screen/raw-text': ['error', { textElements: '(Text|Mono|Heading|TSpan)$|^(Notice|EmptyState|style|title|option)$' }],
      'screen/named-controls': 'error',
    },
  },
  {
    // A component is long because of its markup; what it decides belongs into hooks and pure functions.
    files: ['app/**/*.tsx', 'components/**/*.tsx', ...tests],
    rules: { 'max-lines-per-function': 'off' },
  },
  {
    files: ['app/**/*.{ts,tsx}'],
    rules: { 'max-lines': ['error', { max: 60, skipBlankLines: true, skipComments: true }] },
  },
  {
    files: shared,
    rules: {
      'no-console': 'error',
      ...forbidImports(
        [folder('server', 'components', 'app', 'tests', 'assets'), 'shared/ stands below everything else and imports nothing of it.'],
        ['^(?!\\.|@shared/|@konfirm/iso7064$|luxon$)', 'shared/ is pure: no React, Express, TypeORM or Node.'],
      ),
      'no-restricted-globals': ['error', ...['process', 'window', 'document', 'fetch', 'setTimeout', 'setInterval', 'crypto', 'performance', 'Buffer']
        .map((name) => ({ name, message: 'shared/ is pure: it runs the same in browser, server and tests.' }))],
      'no-restricted-syntax': ['error',
        { selector: `CallExpression[callee.object.name='Date'][callee.property.name='now']`, message: pure },
        { selector: `NewExpression[callee.name='Date'][arguments.length=0]`, message: pure },
        { selector: `MemberExpression[object.name='Math'][property.name='random']`, message: pure },
        { selector: `CallExpression[callee.object.name='DateTime'][callee.property.name=/^(now|local|utc)$/][arguments.length=0]`, message: pure },
      ],
    },
  },
  {
    files: server,
    rules: {
      'no-console': 'error',
      ...forbidImports([folder('components', 'app', 'tests'), 'The server may not import the browser app.'], ['^(react|react-dom|react-native|expo)([-/]|$)', 'The server renders no React.']),
    },
  },
  {
    files: server,
    ignores: ['server/database/**'],
    rules: {
      'no-restricted-syntax': ['error',
        { selector: `MemberExpression[object.name=/dataSource$/i][property.name=/^(${globalManager})$/]`, message: useUnitOfWork },
        { selector: `MemberExpression[object.property.name=/dataSource$/i][property.name=/^(${globalManager})$/]`, message: useUnitOfWork },
      ],
    },
  },
  {
    // The schema is read from top to bottom, like a document.
    files: ['server/database/migrations/**'],
    rules: { 'max-lines-per-function': 'off' },
  },
  {
    // Numeric loops index arrays whose length they have just made.
    files: ['shared/gem/**', 'shared/evidence/**'],
    rules: { '@typescript-eslint/no-non-null-assertion': 'off' },
  },
  {
    files: tests,
    rules: {
      // A test that meets undefined where it expects a value fails there and then, which is what it is for.
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/unbound-method': 'off',
    },
  },
  {
    files: scripts,
    languageOptions: { ecmaVersion: 2024 },
    rules: { 'no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }], eqeqeq: ['error', 'always', { null: 'ignore' }], 'prefer-const': 'error', 'no-var': 'error' },
  },
);
