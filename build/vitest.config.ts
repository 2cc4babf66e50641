import vue from '@vitejs/plugin-vue'
import { fileURLToPath } from 'node:url'
import { defineConfig } from 'vitest/config'

const root = fileURLToPath(new URL('..', import.meta.url))

/** Projects by the rooms they test. Browser tests drive real Chromium and run in their own project, one file at a time. */
export default defineConfig({
  root,
  test: {
    root,
    projects: [
      {
        root,
        test: { name: 'core', root, environment: 'node', include: ['test/core/**/*.test.ts', 'test/build/**/*.test.ts'] },
      },
      { root, test: { name: 'app', root, environment: 'node', include: ['test/app/**/*.test.ts'] } },
      {
        root,
        plugins: [vue()],
        test: { name: 'renderer', root, environment: 'happy-dom', include: ['test/renderer/**/*.test.ts'] },
      },
      {
        root,
        test: {
          name: 'browser',
          root,
          environment: 'node',
          include: ['test/browser/**/*.test.ts', 'test/desktop/**/*.test.ts'],
          testTimeout: 120_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
    ],
  },
})
