import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { compileModule, moduleSource } from '../../../build/kernel/module.mjs'
import { tableSource } from '../../../build/kernel/tableSource.mjs'

const committed = (name: string): string =>
  readFileSync(new URL(`../../../core/kernel/${name}`, import.meta.url), 'utf8').replaceAll('\r\n', '\n')

describe('generated files of core/kernel', () => {
  it('holds the table that its script makes', () => {
    expect(committed('kernelTable.ts')).toBe(tableSource())
  })

  it('holds the module that its source compiles to', { timeout: 60_000 }, async () => {
    expect(committed('kernelModule.ts')).toBe(moduleSource(await compileModule()))
  })
})
