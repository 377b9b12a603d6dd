import { defineConfig } from 'vitest/config';

export default defineConfig({
  resolve: { conditions: ['heddle-src', 'node'] },
  ssr: { resolve: { conditions: ['heddle-src', 'node', 'module', 'default'] } },
  test: { include: ['headless/*.spec.ts'], environment: 'node', testTimeout: 60_000 },
});
