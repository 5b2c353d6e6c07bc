import eslint from '@eslint/js';
import angular from 'angular-eslint';
import prettier from 'eslint-config-prettier';
import tseslint from 'typescript-eslint';

/** The house's arrows: src -> shared <- server; in shared contracts -> engine -> units. */
const closed = (...patterns) => ['error', { patterns }];
const door = (group, message) => ({ group, message });
const noApplication = door(
  ['**/src/app/**', '@angular/*'],
  'The application is out of reach here.',
);
const noServer = door(['#server/*', '**/server/**'], 'The server is out of reach here.');
const noNode = door(
  ['node:*', 'fs', 'path', 'crypto', 'os', 'child_process', 'worker_threads'],
  'shared/ runs in the browser and on the server: no Node API.',
);
const noContracts = door(
  ['#shared/contracts/*', '**/contracts/*'],
  'The engine knows nothing of the API: contracts import the engine, not the other way.',
);
const noEngine = door(['#shared/engine/**', '**/engine/**'], 'units/ is below the engine.');
const noRoutes = door(
  [
    'express*',
    'sequelize',
    '#server/http/*',
    '#server/database/**',
    '**/http/*',
    '**/database/**',
    '**/routes',
    '**/*-routes',
    '#server/cases/*',
    '#server/exhibits/*',
    '#server/custody/*',
    '#server/disclosure/*',
  ],
  'ledger/, store/ and archive/ know nothing of routes and of the database.',
);

/** The engine answers the same for the same input: no clock, no chance. */
const noClockNoChance = [
  'error',
  { selector: "NewExpression[callee.name='Date']", message: 'The engine has no clock.' },
  {
    selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']",
    message: 'The engine has no clock.',
  },
  {
    selector: "CallExpression[callee.object.name='performance']",
    message: 'The engine has no clock.',
  },
  {
    selector: "MemberExpression[object.name='Math'][property.name='random']",
    message: 'The engine draws from a seeded generator.',
  },
];

export default tseslint.config(
  { ignores: ['dist/', 'node_modules/', '.angular/', '.data/', 'coverage/', 'test-results/'] },
  {
    files: ['**/*.ts'],
    extends: [
      eslint.configs.recommended,
      tseslint.configs.strictTypeChecked,
      tseslint.configs.stylistic,
    ],
    languageOptions: {
      parserOptions: {
        project: [
          './tsconfig.server.json',
          './tsconfig.shared.json',
          './tsconfig.spec.json',
          './tsconfig.e2e.json',
        ],
        tsconfigRootDir: import.meta.dirname,
      },
    },
    rules: {
      '@typescript-eslint/no-unused-vars': [
        'error',
        { argsIgnorePattern: '^_', varsIgnorePattern: '^_' },
      ],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/restrict-template-expressions': [
        'error',
        { allowNumber: true, allowBoolean: true },
      ],
      '@typescript-eslint/no-confusing-void-expression': ['error', { ignoreArrowShorthand: true }],
      '@typescript-eslint/no-extraneous-class': ['error', { allowWithDecorator: true }],
      // `type` and `interface` each read well in their place.
      '@typescript-eslint/consistent-type-definitions': 'off',
      // Without noUncheckedIndexedAccess the type of `list[i]` does not say that it may be missing.
      '@typescript-eslint/no-unnecessary-condition': 'off',
      '@typescript-eslint/prefer-for-of': 'off',
      '@typescript-eslint/no-inferrable-types': 'off',
      // What a database row says about its types is a promise, not a fact: conversions stay.
      '@typescript-eslint/no-unnecessary-type-conversion': 'off',
      '@typescript-eslint/no-invalid-void-type': 'off',
      '@typescript-eslint/no-generated-empty-object-type': 'off',
      '@typescript-eslint/no-unsafe-class-instance-assignment': 'off',
      '@typescript-eslint/consistent-indexed-object-style': 'off',
      // Control characters are looked for where texts are cleaned.
      'no-control-regex': 'off',
      eqeqeq: ['error', 'always'],
      'no-warning-comments': ['error', { terms: ['todo', 'fixme', 'xxx'] }],
    },
  },
  {
    files: ['src/**/*.ts'],
    extends: [angular.configs.tsRecommended],
    processor: angular.processInlineTemplates,
    rules: {
      'no-restricted-imports': closed(noServer, noNode),
      '@angular-eslint/prefer-on-push-component-change-detection': 'error',
      '@angular-eslint/component-selector': [
        'error',
        { type: 'element', prefix: ['app', 'ui'], style: 'kebab-case' },
      ],
      '@angular-eslint/directive-selector': [
        'error',
        { type: 'attribute', prefix: ['app', 'ui'], style: 'camelCase' },
      ],
      // Validators are pure functions and `compose` is one too.
      '@typescript-eslint/unbound-method': ['error', { ignoreStatic: true }],
    },
  },
  {
    files: ['src/**/*.html'],
    extends: [angular.configs.templateRecommended, angular.configs.templateAccessibility],
    rules: {
      '@angular-eslint/template/no-inline-styles': ['error', { allowBindToStyle: true }],
      '@angular-eslint/template/prefer-control-flow': 'error',
      '@angular-eslint/template/button-has-type': 'error',
    },
  },
  {
    files: ['shared/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: { 'no-restricted-imports': closed(noApplication, noServer, noNode) },
  },
  {
    files: ['shared/engine/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: {
      'no-restricted-imports': closed(noApplication, noServer, noNode, noContracts),
      'no-restricted-syntax': noClockNoChance,
      'no-restricted-globals': ['error', 'fetch', 'document', 'window', 'process', 'setTimeout'],
    },
  },
  {
    files: ['shared/units/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: {
      'no-restricted-imports': closed(noApplication, noServer, noNode, noContracts, noEngine),
    },
  },
  {
    files: ['server/**/*.ts'],
    rules: { 'no-restricted-imports': closed(noApplication) },
  },
  {
    files: ['server/{ledger,store,archive}/**/*.ts'],
    ignores: ['**/*.spec.ts'],
    rules: { 'no-restricted-imports': closed(noApplication, noRoutes) },
  },
  {
    // Specs compare with stated values and reach into fixtures.
    files: ['**/*.spec.ts', 'test/**/*.ts', 'server/testing/**/*.ts'],
    rules: {
      '@angular-eslint/prefer-on-push-component-change-detection': 'off',
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
      '@typescript-eslint/unbound-method': 'off',
      '@typescript-eslint/no-empty-function': 'off',
    },
  },
  prettier,
);
