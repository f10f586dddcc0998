import next from 'eslint-config-next/core-web-vitals';
import nextTypescript from 'eslint-config-next/typescript';
import tseslint from 'typescript-eslint';

const pureCore = [
  { selector: "CallExpression[callee.object.name='Date'][callee.property.name='now']", message: 'lib/core is pure: take the time as an argument (`at: Instant`).' },
  { selector: "NewExpression[callee.name='Date'][arguments.length=0]", message: 'lib/core is pure: take the time as an argument (`at: Instant`).' },
  { selector: "MemberExpression[object.name='Math'][property.name='random']", message: 'lib/core is pure: take a seeded generator as an argument.' },
  { selector: "MemberExpression[object.name='process']", message: 'lib/core reads no environment: take the value as an argument.' },
];

const config = [
  { ignores: ['node_modules/**', '**/.next*/**', '.data/**', 'next-env.d.ts', 'coverage/**', 'out/**'] },
  ...next,
  ...nextTypescript,
  {
    files: ['**/*.{ts,tsx}'],
    // One program for all of it: the service that editors use opens each file anew.
    languageOptions: { parserOptions: { project: './tsconfig.json', tsconfigRootDir: import.meta.dirname } },
    plugins: { '@typescript-eslint': tseslint.plugin },
    rules: {
      '@typescript-eslint/no-floating-promises': 'error',
      '@typescript-eslint/switch-exhaustiveness-check': ['error', { considerDefaultExhaustiveForUnions: true }],
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      'no-restricted-syntax': [
        'error',
        { selector: "MemberExpression[object.name='process'][property.name='env']", message: 'Only lib/config/env.ts reads the environment: import `env` from there.' },
      ],
    },
  },
  { files: ['lib/core/**/*.ts'], rules: { 'no-restricted-syntax': ['error', ...pureCore] } },
  // A test's `useDatabase()` is no React hook.
  { files: ['tests/**'], rules: { 'react-hooks/rules-of-hooks': 'off' } },
  {
    // The reader of the environment itself, and the files that build an environment for a child process.
    files: ['lib/config/env.ts', 'scripts/**', 'tests/**', 'vitest.config.ts', 'instrumentation.ts', 'next.config.mjs'],
    rules: { 'no-restricted-syntax': 'off' },
  },
];

export default config;
