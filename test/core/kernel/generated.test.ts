import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { compileModule, moduleSource } from '../../../build/kernel/module.mjs'

const committed = (name: string): string =>
  readFileSync(new URL(`../../../core/kernel/${name}`, import.meta.url), 'utf8').replaceAll('\r\n', '\n')

describe('the generated file of core/kernel', () => {
  it('holds the module that its source compiles to', { timeout: 60_000 }, async () => {
    expect(committed('kernelModule.ts')).toBe(moduleSource(await compileModule()))
  })
})
