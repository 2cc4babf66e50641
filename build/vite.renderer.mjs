/**
 * How the window's page is bundled: relative addresses, so that the app scheme and the loopback server serve the same
 * files; nothing inline, so that the content security policy holds.
 */
import vue from '@vitejs/plugin-vue'
import { LICENCE_LIST, noticesFile } from './scripts/notices.mjs'
import { startList } from './scripts/pageWeight.mjs'
import { inProject } from './scripts/root.mjs'
import { threeParts } from './scripts/threeParts.mjs'
import { workerEntries } from './scripts/workerEntry.mjs'
import { constants } from './vite.app.mjs'

/** @returns {import('vite').InlineConfig} */
export function rendererConfig() {
  return {
    configFile: false,
    root: inProject('renderer'),
    base: './',
    logLevel: 'warn',
    publicDir: false,
    cacheDir: inProject('node_modules/.vite'),
    plugins: [vue(), workerEntries(), threeParts(), noticesFile(), startList()],
    define: { ...constants(), __VUE_OPTIONS_API__: 'false' },
    build: {
      target: 'es2023',
      outDir: inProject('dist/renderer'),
      emptyOutDir: true,
      assetsDir: 'assets',
      assetsInlineLimit: 0,
      // Off: what stands before an import would look for a document, and core is imported in workers too.
      modulePreload: false,
      sourcemap: false,
      reportCompressedSize: false,
      chunkSizeWarningLimit: 2000,
      rolldownOptions: { checks: { bundlerTimings: false } },
      license: { fileName: LICENCE_LIST },
    },
    server: {
      host: '127.0.0.1',
      headers: {
        'cross-origin-opener-policy': 'same-origin',
        'cross-origin-embedder-policy': 'require-corp',
      },
    },
  }
}
