import { defineConfig } from 'vitest/config';
import react from '@vitejs/plugin-react';
import tailwindcss from '@tailwindcss/vite';

const API_ORIGIN = process.env.IDEM_API_ORIGIN ?? 'http://127.0.0.1:8440';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  publicDir: 'client/public',
  build: { outDir: 'dist/client', emptyOutDir: true, target: 'es2022' },
  server: {
    host: '127.0.0.1',
    proxy: { '/api': API_ORIGIN, '/healthz': API_ORIGIN, '/readyz': API_ORIGIN },
  },
  test: {
    projects: [
      {
        test: {
          name: 'unit',
          include: ['{shared,server,client,db,seed}/**/*.test.{ts,tsx}'],
          environment: 'node',
          testTimeout: 60_000,
        },
      },
      {
        test: {
          name: 'outside',
          include: ['tests/outside/**/*.test.ts'],
          testTimeout: 120_000,
        },
      },
      {
        test: {
          name: 'api',
          include: ['tests/api/**/*.test.ts', 'tests/faults/**/*.test.ts'],
          globalSetup: ['tests/support/global-setup.ts'],
          testTimeout: 60_000,
          hookTimeout: 60_000,
          maxWorkers: 2,
        },
      },
      {
        test: {
          name: 'browser',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: ['tests/support/global-setup.ts', 'tests/support/browser-setup.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
