import js from '@eslint/js';
import svelte from 'eslint-plugin-svelte';
import globals from 'globals';
import ts from 'typescript-eslint';
import svelteConfig from './svelte.config.js';

/** Rooms in which nothing may touch a page, a process or a clock (DEVELOPERS.md, "Rules of the rooms"). */
const PURE_ROOMS = [
  'air',
  'profile',
  'site',
  'ingest',
  'quality',
  'jet',
  'rotor',
  'moisture',
  'storm',
  'outlook',
  'watch',
  'desk',
  'plot',
];

export default ts.config(
  { ignores: ['dist/', 'node_modules/', 'coverage/'] },
  js.configs.recommended,
  ...ts.configs.strictTypeChecked,
  ...svelte.configs.recommended,
  {
    languageOptions: {
      globals: { ...globals.browser, ...globals.node },
      parserOptions: {
        projectService: { allowDefaultProject: ['*.js', '.dependency-cruiser.cjs'] },
        extraFileExtensions: ['.svelte'],
      },
    },
    rules: {
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true, allowBoolean: true }],
      '@typescript-eslint/no-non-null-assertion': 'off',
      '@typescript-eslint/no-unnecessary-condition': 'off',
      '@typescript-eslint/explicit-module-boundary-types': 'error',
      '@typescript-eslint/no-confusing-void-expression': ['error', { ignoreArrowShorthand: true }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      'no-console': 'error',
      eqeqeq: 'error',
    },
  },
  {
    files: ['**/*.svelte', '**/*.svelte.ts'],
    languageOptions: { parserOptions: { parser: ts.parser, svelteConfig } },
    rules: {
      // Type information does not cross into templates reliably; svelte-check covers those.
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
      '@typescript-eslint/explicit-module-boundary-types': 'off',
      'prefer-const': 'off',
      'svelte/prefer-const': 'error',
    },
  },
  {
    files: PURE_ROOMS.map((room) => `src/${room}/**/*.ts`),
    rules: {
      'no-restricted-globals': [
        'error',
        'window',
        'document',
        'navigator',
        'localStorage',
        'process',
        'Buffer',
        'performance',
        'setInterval',
      ],
      'no-restricted-properties': [
        'error',
        { object: 'Date', property: 'now', message: 'Time is an argument below board and relay.' },
      ],
      'no-restricted-syntax': [
        'error',
        {
          selector: "NewExpression[callee.name='Date'][arguments.length=0]",
          message: 'Time is an argument below board and relay.',
        },
        {
          selector: "CallExpression[callee.object.name='Math'][callee.property.name='random']",
          message: 'Pure rooms are deterministic: pass a generator.',
        },
      ],
    },
  },
  {
    // The canvas is plot's own trade; only the clock and chance stay out.
    files: ['src/plot/**/*.ts'],
    rules: {
      'no-restricted-globals': ['error', 'window', 'navigator', 'localStorage', 'process', 'Buffer', 'setInterval'],
    },
  },
  { files: ['src/relay/**', 'test/**', 'demo-profiles/**'], rules: { 'no-console': 'off' } },
  { files: ['**/*.js', '**/*.mjs', '**/*.cjs'], ...ts.configs.disableTypeChecked },
  { files: ['**/*.js', '**/*.mjs', '**/*.cjs'], rules: { '@typescript-eslint/explicit-module-boundary-types': 'off' } },
);
