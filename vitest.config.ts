import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'vitest/config'

/** The layers of tests; each can be run alone with `npx vitest --project NAME`. */
export default defineConfig({
  test: {
    projects: [
      { test: { name: 'engine', environment: 'node', include: ['tests/engine/**/*.test.ts'] } },
      { test: { name: 'reading', environment: 'node', include: ['tests/reading/**/*.test.ts'], testTimeout: 30_000 } },
      { test: { name: 'cli', environment: 'node', include: ['tests/cli/**/*.test.ts'], testTimeout: 30_000 } },
      {
        test: {
          name: 'server',
          environment: 'node',
          include: ['tests/server/**/*.test.ts'],
          fileParallelism: false,
          globalSetup: ['tests/support/database.global.ts'],
          testTimeout: 20_000,
          hookTimeout: 60_000,
        },
      },
      {
        plugins: [vue()],
        test: {
          name: 'client',
          environment: 'happy-dom',
          include: ['tests/client/**/*.test.ts'],
          setupFiles: ['tests/client/setup.ts'],
          server: { deps: { inline: ['vuetify'] } },
        },
      },
    ],
  },
})
