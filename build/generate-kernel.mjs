/**
 * Writes the two generated files of core/kernel: the table of the coaxial kernel and the WebAssembly module.
 *
 * Run `node build/generate-kernel.mjs` after changing build/kernel/table.mjs or core/kernel/assembly; a test compares
 * the committed files with what this makes.
 */
import { writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { compileModule, moduleSource } from './kernel/module.mjs'
import { tableSource } from './kernel/tableSource.mjs'

const room = fileURLToPath(new URL('../core/kernel/', import.meta.url))

writeFileSync(`${room}kernelTable.ts`, tableSource())
writeFileSync(`${room}kernelModule.ts`, moduleSource(await compileModule()))
