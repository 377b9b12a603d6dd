import js from '@eslint/js';
import hooks from 'eslint-plugin-react-hooks';
import { defineConfig, globalIgnores } from 'eslint/config';
import globals from 'globals';
import tseslint from 'typescript-eslint';

/** Floors of the engine from the ground up: each may import itself and the floors before it. */
const FLOORS = [
  'constants',
  'nuclides',
  'documents',
  'run',
  'algebra',
  'interactions',
  'sequence',
  'orientations',
  'spectrum',
  'dynamics',
  'report',
  'simulate',
];

const imports = (patterns) => ({ 'no-restricted-imports': ['error', { patterns }] });
const wall = (group, message) => ({ group, message });

const shared = wall(
  ['node:*', 'fs', 'path', 'react', 'react-dom', '@nestjs/*', '@mantine/*', '@heddle/*', '**/apps/**'],
  'shared is pure TypeScript: no Node, no DOM, no framework, neither app',
);
const web = wall(
  ['@heddle/api', '**/apps/api/**', '@nestjs/*', 'node:*'],
  'the client knows the server by its OpenAPI document only',
);
const api = wall(['@heddle/web', '**/apps/web/**', 'react', 'react-dom'], 'the server does not know the client');

const floors = FLOORS.map((floor, i) => {
  const above = FLOORS.slice(i + 1).map((name) => `**/${name}/**`);
  const message = `${floor} stands below: it may import ${FLOORS.slice(0, i).join(', ') || 'nothing of the engine'}`;
  return {
    files: [`shared/src/${floor}/**/*.ts`],
    ignores: ['**/*.spec.ts'],
    rules: imports([shared, ...(above.length > 0 ? [wall(above, message)] : [])]),
  };
});

export default defineConfig(
  globalIgnores([
    '**/dist',
    '**/coverage',
    '.data',
    'scripts/peers',
    'shared/assembly',
    'apps/web/src/api/schema.d.ts',
  ]),
  js.configs.recommended,
  {
    files: ['**/*.{ts,tsx}'],
    extends: [tseslint.configs.recommendedTypeChecked],
    languageOptions: { parserOptions: { projectService: true, tsconfigRootDir: import.meta.dirname } },
    rules: {
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_', varsIgnorePattern: '^_' }],
      '@typescript-eslint/restrict-template-expressions': ['error', { allowNumber: true, allowBoolean: true }],
      // Objects made by closures are taken apart freely; their functions use no `this`.
      '@typescript-eslint/unbound-method': 'off',
      // Array indices are checked by tests and by the loops themselves; the compiler runs without noUncheckedIndexedAccess.
      '@typescript-eslint/no-non-null-assertion': 'off',
    },
  },
  { files: ['**/*.{js,mjs,cjs}'], languageOptions: { globals: globals.node } },
  {
    // Replies of supertest and parsed JSON are `any`, which is what a test wants to look into.
    files: ['**/*.spec.{ts,tsx}', '**/test/**/*.{ts,tsx}'],
    rules: {
      '@typescript-eslint/no-unsafe-assignment': 'off',
      '@typescript-eslint/no-unsafe-member-access': 'off',
      '@typescript-eslint/no-unsafe-argument': 'off',
      '@typescript-eslint/no-unsafe-call': 'off',
      '@typescript-eslint/no-unsafe-return': 'off',
    },
  },
  { files: ['shared/src/**/*.ts'], ignores: ['**/*.spec.ts'], rules: imports([shared]) },
  ...floors,
  {
    files: ['apps/web/src/**/*.{ts,tsx}'],
    ignores: ['**/*.spec.{ts,tsx}'],
    extends: [hooks.configs.flat.recommended],
    rules: imports([web]),
  },
  { files: ['apps/api/src/**/*.ts'], rules: imports([api]) },
);
