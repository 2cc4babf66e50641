import { describe, expect, it } from 'vitest'
import { inProject } from '../../build/scripts/root.mjs'
import { isForeign, loadedModules } from '../../build/scripts/workerEntry.mjs'

function chunk(moduleIds: readonly string[], imports: readonly string[] = [], dynamicImports: readonly string[] = []) {
  return { type: 'chunk', moduleIds, imports, dynamicImports } as const
}

describe('what a worker loads', () => {
  const bundle = {
    'worker.js': chunk(['entry'], ['shared.js']),
    'shared.js': chunk(['plan', 'ring'], ['worker.js'], ['later.js']),
    'later.js': chunk(['table']),
    'page.js': chunk(['App'], ['shared.js']),
    'page.css': { type: 'asset' } as const,
  }

  it('is every module of the chunks it reaches, and not those of the page', () => {
    expect(loadedModules('worker.js', bundle)).toEqual(['entry', 'plan', 'ring', 'table'])
    expect(loadedModules('page.js', bundle)).toContain('App')
  })

  it('comes from core and its own room only', () => {
    const ours = [
      inProject('core', 'plan', 'index.ts'),
      inProject('renderer', 'worker', 'serve.ts'),
      inProject('node_modules', 'papaparse', 'papaparse.min.js'),
      '\0rolldown/runtime.js',
      // Only passes an import on: module preload is off.
      '\0vite/preload-helper.js',
    ]
    const foreign = [
      inProject('renderer', 'scene', 'stage.ts'),
      inProject('renderer', 'App.vue'),
      inProject('node_modules', 'three', 'build', 'three.module.js'),
    ]
    expect(ours.filter(isForeign)).toEqual([])
    expect(foreign.filter(isForeign)).toEqual(foreign)
  })
})
