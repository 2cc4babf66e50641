import vue from '@vitejs/plugin-vue'
import { defineConfig } from 'vitest/config'
import { ROOT } from './scripts/root.mjs'
import { constants } from './vite.app.mjs'

/** What every project shares. A new object each time: Vitest takes the constants out of the one it is given. */
const shared = () => ({ root: ROOT, define: constants() })

/** Projects by the rooms they test. Browser tests drive real Chromium and run in their own project, one file at a time. */
export default defineConfig({
  root: ROOT,
  test: {
    root: ROOT,
    projects: [
      {
        ...shared(),
        test: {
          name: 'core',
          root: ROOT,
          environment: 'node',
          include: ['test/core/**/*.test.ts', 'test/build/**/*.test.ts'],
          setupFiles: ['test/support/seed.ts'],
          // The linter is loaded whole for the law of imports: seconds on a slow machine.
          testTimeout: 60_000,
        },
      },
      {
        ...shared(),
        test: {
          name: 'app',
          root: ROOT,
          environment: 'node',
          include: ['test/app/**/*.test.ts'],
          setupFiles: ['test/support/seed.ts'],
          testTimeout: 30_000,
        },
      },
      {
        ...shared(),
        plugins: [vue()],
        test: {
          name: 'renderer',
          root: ROOT,
          environment: 'happy-dom',
          include: ['test/renderer/**/*.test.ts'],
          setupFiles: ['test/support/seed.ts'],
          testTimeout: 30_000,
        },
      },
      {
        ...shared(),
        test: {
          name: 'browser',
          root: ROOT,
          environment: 'node',
          include: ['test/browser/**/*.test.ts', 'test/desktop/**/*.test.ts'],
          globalSetup: ['build/scripts/freshBuild.mjs'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
})
