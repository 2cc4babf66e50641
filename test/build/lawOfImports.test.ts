import { ESLint } from 'eslint'
import { describe, expect, it } from 'vitest'
import { breach } from '../../build/eslint/law-of-imports.js'
import { ROOT } from '../../build/scripts/root.mjs'

const eslint = new ESLint({ cwd: ROOT, overrideConfigFile: 'build/eslint.config.js' })

/** What the project's own linter says about a text as if it were a file of the project. */
async function lint(filePath: string, text: string): Promise<readonly { rule: string | null; message: string }[]> {
  const results = await eslint.lintText(text, { filePath, warnIgnored: true })
  return results.flatMap((result) =>
    result.messages.map(({ ruleId, message, severity }) => {
      expect(severity).toBe(2)
      return { rule: ruleId, message }
    }),
  )
}

describe('the law of imports, by the linter', () => {
  it.each([
    ['a page library in core', 'core/ring/planted.ts', "import { ref } from 'vue'", /allow-list/],
    ['Node in core', 'core/ring/planted.ts', "import { readFileSync } from 'node:fs'", /allow-list/],
    ['an upward import in core', 'core/water/planted.ts', "import { run } from '../run'", /upward from core\/run/],
    ['an import past an index', 'core/pulse/planted.ts', "import { at } from '../base/arrays'", /through its index/],
    ['app in core', 'core/run/planted.ts', "import { COMMANDS } from '../../app/contract'", /only core/],
    ['renderer in core', 'core/run/planted.ts', "import { createHost } from '../../renderer/host'", /only core/],
    [
      'an allowed package outside its adapter',
      'core/run/planted.ts',
      "import Papa from 'papaparse'",
      /only in core\/plan/,
    ],
    ['electron in the page', 'renderer/host/planted.ts', "import { ipcRenderer } from 'electron'", /import electron/],
    ['Node in the page', 'renderer/host/planted.ts', "import path from 'node:path'", /may not import node:path/],
    [
      'main’s files in the page',
      'renderer/host/planted.ts',
      "import { dispatch } from '../../app/dispatch'",
      /contract/,
    ],
    [
      'an import past an index in the page',
      'renderer/model/planted.ts',
      "import { run } from '../../core/run/run'",
      /index/,
    ],
    ['electron outside main and preload', 'app/planted.ts', "import { app } from 'electron'", /import electron/],
    ['the page in app', 'app/planted.ts', "import { createHost } from '../renderer/host'", /from renderer/],
    [
      'a low room of core in app',
      'app/planted.ts',
      "import { waterProperties } from '../core/water'",
      /app may import only/,
    ],
    ['a package in app', 'app/planted.ts', "import Papa from 'papaparse'", /app may not import papaparse/],
    ['a breach by re-export', 'core/ring/planted.ts', "export { ref } from 'vue'", /allow-list/],
    ['a breach by a late import', 'core/ring/planted.ts', "export const load = () => import('vue')", /allow-list/],
  ])('refuses %s', async (_what, filePath, text, why) => {
    const found = await lint(filePath, `${text}\n`)
    expect(found.filter(({ rule }) => rule === 'house/law-of-imports').map(({ message }) => message)).toEqual([
      expect.stringMatching(why),
    ])
  })

  it('refuses a breach inside a component', async () => {
    const text = `<script setup lang="ts">\nimport { shell } from 'electron'\nshell.beep()\n</script>\n\n<template><p>x</p></template>\n`
    const found = await lint('renderer/parts/Planted.vue', text)
    expect(found.map(({ rule }) => rule)).toContain('house/law-of-imports')
  })

  it.each([
    ['a lower room through its index', 'core/pulse/planted.ts', "export { at } from '../base'"],
    ['its own room', 'core/pulse/planted.ts', "export { at } from './arrays'"],
    ['the contract in the page', 'renderer/host/planted.ts', "export { COMMANDS } from '../../app/contract'"],
    ['core in the page', 'renderer/model/planted.ts', "export { run } from '../../core/run'"],
    ['Node in app', 'app/planted.ts', "export { readFile } from 'node:fs/promises'"],
    ['electron in main', 'app/main.ts', "export { app } from 'electron'"],
  ])('allows %s', async (_what, filePath, text) => {
    expect(await lint(filePath, `${text}\n`)).toEqual([])
  })
})

describe('the house rules, by the linter', () => {
  it.each([
    [
      'a cast',
      'core/ring/planted.ts',
      'export const x = JSON.parse("1") as number',
      '@typescript-eslint/consistent-type-assertions',
    ],
    ['any', 'core/ring/planted.ts', 'export const x: any = 1', '@typescript-eslint/no-explicit-any'],
    ['a non-null mark', 'app/planted.ts', 'export const x = [1].at(0)!', '@typescript-eslint/no-non-null-assertion'],
    ['a default export', 'core/ring/planted.ts', 'export default 1', 'no-restricted-syntax'],
    ['exporting everything', 'core/ring/planted.ts', "export * from './rings'", 'no-restricted-syntax'],
    ['the clock in core', 'core/ring/planted.ts', 'export const x = Date.now()', 'no-restricted-globals'],
    ['writing to the console', 'renderer/model/planted.ts', "console.log('x')", 'no-console'],
  ])('refuse %s', async (_what, filePath, text, rule) => {
    expect((await lint(filePath, `${text}\n`)).map((found) => found.rule)).toContain(rule)
  })

  it('let a decoder cast after its check', async () => {
    expect(await lint('app/decodePlanted.ts', 'export const x = JSON.parse("1") as number\n')).toEqual([])
  })
})

describe('breach', () => {
  it('judges tests by nothing: they may look anywhere', () => {
    expect(breach('test/core/ring/x.test.ts', '../../../core/ring/inside')).toBeNull()
  })
})
