/**
 * How Electron's main, its preload, the runner and the loopback server are bundled: each one file that needs no packages.
 */
import { readFileSync } from 'node:fs'
import { builtinModules } from 'node:module'
import { inProject, ROOT } from './scripts/root.mjs'

/** @typedef {{ readonly source: string, readonly file: string, readonly format: 'es' | 'cjs' }} Entry */

/** @type {readonly Entry[]} */
export const APP_ENTRIES = [
  { source: 'app/main.ts', file: 'main.mjs', format: 'es' },
  // A sandboxed preload must be one CommonJS file.
  { source: 'app/preload.ts', file: 'preload.cjs', format: 'cjs' },
  { source: 'app/batch.ts', file: 'batch.mjs', format: 'es' },
  { source: 'app/serve.ts', file: 'serve.mjs', format: 'es' },
]

/** Constants put in place at build time, the same for every part and for the tests. */
export function constants() {
  const { version } = JSON.parse(readFileSync(inProject('package.json'), 'utf8'))
  return { __RINGWRIGHT_VERSION__: JSON.stringify(version) }
}

/** @param {Entry} entry @returns {import('vite').InlineConfig} */
export function appConfig(entry) {
  return {
    configFile: false,
    root: ROOT,
    logLevel: 'warn',
    publicDir: false,
    define: constants(),
    build: {
      ssr: true,
      target: 'node20',
      outDir: inProject('dist/app'),
      emptyOutDir: false,
      sourcemap: false,
      minify: false,
      reportCompressedSize: false,
      rolldownOptions: {
        input: inProject(entry.source),
        checks: { bundlerTimings: false },
        external: ['electron', ...builtinModules, /^node:/],
        output: { format: entry.format, entryFileNames: entry.file, codeSplitting: false },
      },
    },
    ssr: { noExternal: true },
  }
}
