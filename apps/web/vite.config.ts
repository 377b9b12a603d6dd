import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

/** Where the API listens while the client is served by Vite. */
const api = process.env['HEDDLE_API'] ?? 'http://127.0.0.1:3000';

export default defineConfig({
  plugins: [react()],
  // 'heddle-src' reads the shared package from its sources; the others are Vite's defaults, which this list replaces.
  resolve: { conditions: ['heddle-src', 'module', 'browser', 'development|production'] },
  server: { proxy: { '/api': api } },
  build: { target: 'es2022', sourcemap: true },
  worker: { format: 'es' },
  test: {
    environment: 'jsdom',
    include: ['src/**/*.spec.{ts,tsx}', 'test/**/*.spec.{ts,tsx}'],
    setupFiles: './test/setup.ts',
    css: false,
  },
});
