/// <reference types="vitest/config" />
import vue from '@vitejs/plugin-vue'
import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vite'

const folder = (path: string) => fileURLToPath(new URL(path, import.meta.url))

const alias = { '@': folder('./client/src') }

export default defineConfig({
  root: folder('./client'),
  plugins: [vue()],
  resolve: { alias },
  build: { outDir: folder('./dist/client'), emptyOutDir: true, chunkSizeWarningLimit: 700 },
  server: { proxy: { '/api': `http://127.0.0.1:${process.env.PORT ?? 3000}` } },
  test: {
    // Most tests wait for PostgreSQL: one more worker than two processors keeps both busy.
    maxWorkers: 3,
    projects: [
      {
        extends: true,
        root: folder('.'),
        test: { name: 'unit', include: ['shared/**/*.test.ts', 'server/**/*.test.ts', 'fake-services/**/*.test.ts', 'tests/support/**/*.test.ts', 'tests/reference/**/*.test.ts'], environment: 'node', testTimeout: 30_000 },
      },
      {
        extends: true,
        root: folder('.'),
        test: { name: 'client', include: ['client/src/**/*.test.ts'], environment: 'happy-dom', testTimeout: 30_000 },
      },
      {
        extends: true,
        root: folder('.'),
        test: {
          name: 'api',
          include: ['tests/api/**/*.test.ts', 'tests/drawings/**/*.test.ts'],
          environment: 'node',
          globalSetup: ['tests/support/template-database.ts'],
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
      {
        extends: true,
        root: folder('.'),
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          environment: 'node',
          globalSetup: ['tests/support/template-database.ts'],
          testTimeout: 300_000,
          hookTimeout: 120_000,
          maxWorkers: 2,
        },
      },
    ],
  },
})
