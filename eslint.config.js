import { readdirSync } from 'node:fs';
import js from '@eslint/js';
import { createTypeScriptImportResolver } from 'eslint-import-resolver-typescript';
import { importX } from 'eslint-plugin-import-x';
import jsxA11y from 'eslint-plugin-jsx-a11y';
import reactHooks from 'eslint-plugin-react-hooks';
import tseslint from 'typescript-eslint';

/** Forbids `target` to import from any of `from`, save from the places in `except`. */
const zone = (target, from, message, except = []) => ({ target, from, message, except });
const server = (part) => `./server/${part}`;
const inner = ['contracts', 'engine', 'domain', 'store', 'adapters', 'use-cases', 'http', 'jobs'];
const allBut = (...parts) => inner.filter((part) => !parts.includes(part)).map(server);

const features = readdirSync(new URL('./client/features', import.meta.url));
const apart = features.map((name) =>
  zone(`./client/features/${name}`, './client/features', 'Features meet in client/app.', [name]),
);

// Arrows that may carry types only are finer than zones can tell; tests/architecture checks those.
const zones = [
  ...apart,
  zone('./client', './server', 'The client knows only server/contracts.', ['contracts']),
  zone('./client/lib', ['./client/ui', './client/features', './client/app'], 'lib stands alone.'),
  zone('./client/ui', ['./client/features', './client/app'], 'ui knows no feature.'),
  zone('./client/features', './client/app', 'Features do not know the app around them.'),
  zone('./server', './client', 'The server does not know the client.'),
  zone(server('contracts'), allBut('contracts'), 'Contracts import zod only.'),
  zone(server('engine'), allBut('engine'), 'The engine imports itself only.'),
  zone(server('domain'), allBut('domain', 'engine', 'contracts'), 'The domain knows the engine.'),
  zone(
    server('store'),
    ['use-cases', 'http', 'jobs', 'adapters'].map(server),
    'Store knows domain.',
  ),
  zone(
    server('adapters'),
    ['store', 'use-cases', 'http', 'jobs'].map(server),
    'Adapters know ports.',
  ),
  zone(server('use-cases'), ['adapters', 'http', 'jobs'].map(server), 'Use cases know ports.'),
  zone(server('http'), ['adapters', 'jobs'].map(server), 'http calls use cases.'),
  zone(server('jobs'), ['adapters', 'http'].map(server), 'Jobs call use cases.'),
];

const nodeGlobals = Object.fromEntries(
  'process URL fetch setTimeout clearTimeout setInterval AbortSignal Buffer console'
    .split(' ')
    .map((name) => [name, 'readonly']),
);

export default tseslint.config(
  { ignores: ['dist/', 'node_modules/', 'coverage/', '.data/', '.cache/', 'client/public/'] },
  js.configs.recommended,
  {
    files: ['**/*.{ts,tsx}'],
    extends: [tseslint.configs.recommendedTypeChecked],
    languageOptions: {
      parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname },
    },
    plugins: { 'import-x': importX },
    settings: { 'import-x/resolver-next': [createTypeScriptImportResolver()] },
    rules: {
      'import-x/no-restricted-paths': ['error', { basePath: import.meta.dirname, zones }],
      'import-x/no-cycle': ['error', { ignoreExternal: true }],
      '@typescript-eslint/consistent-type-imports': ['error', { fixStyle: 'inline-type-imports' }],
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true }],
      '@typescript-eslint/switch-exhaustiveness-check': [
        'error',
        { considerDefaultExhaustiveForUnions: true },
      ],
      eqeqeq: 'error',
      'no-param-reassign': 'error',
    },
  },
  {
    files: ['server/contracts/**/*.ts'],
    rules: {
      'no-restricted-imports': [
        'error',
        {
          patterns: [{ regex: '^(?!zod$|\\./)', message: 'Contracts import zod and each other.' }],
        },
      ],
    },
  },
  {
    files: ['server/engine/**/*.ts', 'server/domain/**/*.ts'],
    rules: {
      'no-restricted-imports': [
        'error',
        { patterns: [{ regex: '^[^.]', message: 'Engine and domain use no package.' }] },
      ],
      'no-restricted-properties': [
        'error',
        { object: 'Math', property: 'random', message: 'Pass a seeded random source in.' },
        { object: 'Date', property: 'now', message: 'Pass the time in.' },
      ],
    },
  },
  {
    // Knex gives rows untyped; each store function says in its return type what they are.
    files: ['server/store/**/*.ts', 'seeds/**/*.ts'],
    rules: {
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
      '@typescript-eslint/no-unsafe-argument': 'off',
    },
  },
  {
    files: ['client/**/*.{ts,tsx}'],
    extends: [jsxA11y.flatConfigs.recommended, reactHooks.configs.flat.recommended],
  },
  {
    // Tests look into rows and answers of every shape; what they expect of them is the check.
    files: ['tests/**/*.{ts,tsx}'],
    rules: {
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
    },
  },
  { files: ['**/*.mjs', '*.js'], languageOptions: { globals: nodeGlobals } },
);
