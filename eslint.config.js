// @ts-check
import eslint from '@eslint/js';
import angular from 'angular-eslint';
import { defineConfig } from 'eslint/config';
import tseslint from 'typescript-eslint';
import { layer, NO_LEFT_OUT_TESTS, PURE, WRITES } from './eslint.arrows.js';

const SPECS = ['**/*.spec.ts'];

export default defineConfig([
  {
    ignores: ['dist/', 'out-tsc/', '.angular/', 'coverage/', 'data*/', 'test-results/', 'playwright-report/'],
  },
  {
    // A rule is kept or changed here, where everybody sees it; not switched off in a file.
    linterOptions: { noInlineConfig: true },
  },

  // What every file keeps.
  {
    files: ['**/*.js', '**/*.mjs', '**/*.ts'],
    extends: [eslint.configs.recommended],
    rules: {
      eqeqeq: ['error', 'always', { null: 'ignore' }],
      'no-console': 'error',
      'no-warning-comments': ['error', { terms: ['todo', 'fixme', 'xxx'], location: 'start' }],
      'max-lines': ['error', { max: 330, skipBlankLines: true, skipComments: true }],
    },
  },
  {
    files: ['**/*.ts'],
    extends: [tseslint.configs.strict],
    rules: {
      '@typescript-eslint/consistent-type-imports': [
        'error',
        { prefer: 'type-imports', fixStyle: 'inline-type-imports' },
      ],
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      // `output<void>()` is Angular's own way to say that nothing comes with it.
      '@typescript-eslint/no-invalid-void-type': 'off',
      // An Angular component may be a decorator and nothing else.
      '@typescript-eslint/no-extraneous-class': ['error', { allowWithDecorator: true }],
    },
  },

  // Rules that need types: a promise that nobody waits for is a tap that nobody knows was lost.
  {
    files: ['src/**/*.ts', 'api/**/*.ts'],
    ignores: [...SPECS, 'api/testing/**'],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/await-thenable': 'error',
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/no-misused-promises': ['error', { checksVoidReturn: { arguments: false } }],
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
    },
  },
  {
    files: ['src/**/*.ts'],
    ignores: SPECS,
    plugins: { '@angular-eslint': angular.tsPlugin },
    rules: { '@angular-eslint/no-experimental': 'error', '@angular-eslint/no-uncalled-signals': 'error' },
  },

  // Angular.
  {
    files: ['src/**/*.ts'],
    extends: [angular.configs.tsRecommended],
    processor: angular.processInlineTemplates,
    rules: {
      '@angular-eslint/component-selector': [
        'error',
        { type: ['element', 'attribute'], prefix: 'app', style: 'kebab-case' },
      ],
      '@angular-eslint/directive-selector': [
        'error',
        { type: 'attribute', prefix: 'app', style: 'camelCase' },
      ],
      '@angular-eslint/no-lifecycle-call': 'error',
      '@angular-eslint/prefer-host-metadata-property': 'error',
      '@angular-eslint/prefer-inject': 'error',
      '@angular-eslint/prefer-on-push-component-change-detection': 'error',
      '@angular-eslint/prefer-output-emitter-ref': 'error',
      '@angular-eslint/prefer-output-readonly': 'error',
      '@angular-eslint/prefer-signals': 'error',
    },
  },
  {
    files: ['src/**/*.html'],
    extends: [angular.configs.templateRecommended, angular.configs.templateAccessibility],
    rules: {
      '@angular-eslint/template/button-has-type': 'error',
      '@angular-eslint/template/prefer-at-empty': 'error',
      '@angular-eslint/template/prefer-control-flow': 'error',
      '@angular-eslint/template/prefer-self-closing-tags': 'error',
    },
  },

  // The arrows: src → shared ← api; inside src shell → features → offline → core, and all may use ui.
  ...layer('src', ['src/**/*.ts']),
  ...layer('src/app/shell', ['src/app/shell/**/*.ts']),
  ...layer('src/app/features', ['src/app/features/*/*.ts'], { depth: 1 }),
  ...layer('src/app/features', ['src/app/features/*/*/*.ts'], { depth: 2 }),
  ...layer('src/app/features', ['src/app/features/*/*/*/**/*.ts'], { depth: 3 }),
  ...layer('src/app/offline', ['src/app/offline/**/*.ts']),
  ...layer('src/app/core', ['src/app/core/**/*.ts']),
  ...layer('src/app/ui', ['src/app/ui/**/*.ts']),
  ...layer('src/app/ui/chart', ['src/app/ui/chart/**/*.ts']),
  ...layer('shared', ['shared/**/*.ts'], { syntax: PURE }),
  ...layer('shared/at-once', ['shared/{contract,entries,figures}/**/*.ts'], { syntax: PURE }),
  ...layer('shared/chance', ['shared/chance/**/*.ts'], { syntax: PURE }),
  ...layer('api', ['api/**/*.ts'], { syntax: WRITES }),
  ...layer('api/database', ['api/database/**/*.ts']),
  ...layer('api/routes', ['api/features/**/*.routes.ts', 'api/middleware/**/*.ts'], { syntax: WRITES }),

  // Specs: nothing left out, nothing left alone; they may reach for what their layer must not.
  {
    files: [...SPECS, 'test/**/*.ts'],
    rules: {
      'no-restricted-syntax': ['error', ...NO_LEFT_OUT_TESTS],
      '@typescript-eslint/no-non-null-assertion': 'off',
    },
  },
  {
    files: ['shared/**/*.spec.ts'],
    rules: { 'no-restricted-syntax': ['error', ...NO_LEFT_OUT_TESTS, ...PURE] },
  },

  // Commands speak to a person at a terminal.
  {
    files: [
      'scripts/**',
      'api/main.ts',
      'api/rebuild.ts',
      'api/backup.ts',
      'api/restore.ts',
      'api/demo/**',
      'test/bench/**',
      'test/sync/faults/main.ts',
      'test/sync/kill/main.ts',
      'src/main.ts',
      '*.js',
    ],
    rules: { 'no-console': 'off' },
  },
  {
    files: ['**/*.js', '**/*.mjs'],
    languageOptions: {
      globals: Object.fromEntries(
        ['console', 'process', 'URL', 'document', 'localStorage'].map((name) => [name, 'readonly']),
      ),
    },
  },
]);
