import tailwindcss from '@tailwindcss/vite'
import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

const api = process.env['API_URL'] ?? 'http://127.0.0.1:4100'

/** Pages on a busy machine may miss a wait once; twice in a row is a fault. */
const retry = process.env['CI'] ? 1 : 0

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: { outDir: 'dist/client', emptyOutDir: true, sourcemap: false },
  server: { proxy: { '/api': { target: api, changeOrigin: false } } },
  test: {
    projects: [
      {
        extends: true,
        test: { name: 'core', environment: 'node', include: ['tests/{shared,reference,architecture}/**/*.test.ts', 'tests/server/**/*.test.ts'], globalSetup: ['tests/support/global-setup.ts'], testTimeout: 30_000, hookTimeout: 60_000 },
      },
      {
        extends: true,
        test: { name: 'client', environment: 'jsdom', include: ['tests/src/**/*.test.{ts,tsx}'], setupFiles: ['tests/support/client-setup.ts'], retry },
      },
      {
        extends: true,
        test: { name: 'journeys', environment: 'node', include: ['tests/journeys/**/*.test.ts'], globalSetup: ['tests/support/journey-setup.ts'], testTimeout: 180_000, hookTimeout: 180_000, fileParallelism: false, retry },
      },
    ],
  },
})
