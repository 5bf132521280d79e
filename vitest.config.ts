import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

// Three projects: `unit` needs nothing; `http` and `e2e` share one running product that their global set-up starts.
export default defineConfig({
  test: {
    projects: [
      {
        plugins: [react()],
        test: {
          name: 'unit',
          include: ['tests/{physics,ingest,ledger,document,client,architecture,storage,platform}/**/*.test.{ts,tsx}'],
          environment: 'node',
          testTimeout: 30_000,
        },
      },
      {
        test: {
          name: 'http',
          include: ['tests/http/**/*.test.ts'],
          globalSetup: ['tests/support/product-setup.ts'],
          fileParallelism: false,
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
      {
        test: {
          name: 'e2e',
          include: ['tests/e2e/**/*.test.ts'],
          globalSetup: ['tests/support/product-setup.ts'],
          fileParallelism: false,
          testTimeout: 120_000,
          hookTimeout: 120_000,
        },
      },
    ],
  },
})
