import path from 'node:path'
import react from '@vitejs/plugin-react'
import { defineConfig } from 'vitest/config'

const shared = {
  plugins: [react()],
  resolve: { alias: { '@': path.resolve(import.meta.dirname) } },
}
const globalSetup = ['tests/support/stop-test-cluster.ts']

export default defineConfig({
  test: {
    projects: [
      {
        ...shared,
        test: {
          name: 'node',
          environment: 'node',
          include: ['tests/**/*.test.ts'],
          globalSetup,
          testTimeout: 30_000,
        },
      },
      {
        ...shared,
        test: {
          name: 'jsdom',
          environment: 'jsdom',
          include: ['tests/**/*.test.tsx'],
          setupFiles: ['tests/support/jsdom-setup.ts'],
          testTimeout: 30_000,
        },
      },
      {
        ...shared,
        test: {
          name: 'browser',
          environment: 'node',
          include: ['tests/browser/**/*.browser.ts'],
          globalSetup,
          // One browser and one server at a time: pages are timed and pictured, and the machine may have two cores.
          fileParallelism: false,
          maxWorkers: 1,
          sequence: { groupOrder: 1 },
          testTimeout: 120_000,
          hookTimeout: 300_000,
        },
      },
    ],
  },
})
