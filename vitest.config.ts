import { fileURLToPath } from 'node:url'
import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'vitest/config'

const root = fileURLToPath(new URL('.', import.meta.url))

// Projects run one group after another: pages are timed by nobody, but a browser that shares two
// cores with the server tests runs into its own time limits.
const inTurn = (groupOrder: number, maxWorkers: number) => ({ maxWorkers, sequence: { groupOrder } })

export default defineConfig({
  resolve: { alias: { '~': root.replace(/\/$/, ''), '#shared': `${root}shared` } },
  test: {
    projects: [
      {
        extends: true,
        plugins: [vue()],
        test: {
          name: 'unit',
          environment: 'node',
          include: ['tests/unit/**/*.test.ts'],
          testTimeout: 30_000,
          ...inTurn(0, 2),
        },
      },
      {
        extends: true,
        test: {
          name: 'reference',
          environment: 'node',
          include: ['tests/reference/**/*.test.ts'],
          testTimeout: 60_000,
          ...inTurn(0, 2),
        },
      },
      {
        extends: true,
        test: {
          name: 'server',
          environment: 'node',
          include: ['tests/server/**/*.test.ts'],
          globalSetup: 'tests/setup/folders.ts',
          testTimeout: 120_000,
          hookTimeout: 120_000,
          ...inTurn(1, 2),
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          environment: 'node',
          include: ['tests/browser/**/*.test.ts'],
          globalSetup: 'tests/setup/folders.ts',
          testTimeout: 300_000,
          hookTimeout: 300_000,
          ...inTurn(2, 1),
        },
      },
    ],
  },
})
