/**
 * Writes the generated file of core/kernel: the WebAssembly module.
 *
 * Run `node build/generate-kernel.mjs` after changing core/kernel/assembly; a test compares the committed file with what
 * this makes.
 */
import { writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { compileModule, moduleSource } from './kernel/module.mjs'

const room = fileURLToPath(new URL('../core/kernel/', import.meta.url))

writeFileSync(`${room}kernelModule.ts`, moduleSource(await compileModule()))
