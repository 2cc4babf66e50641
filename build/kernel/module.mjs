import { main } from 'assemblyscript/asc'
import { fileURLToPath } from 'node:url'

const ROOM = fileURLToPath(new URL('../../core/kernel/', import.meta.url))

/** Memory kept free of the compiler's own data for the tables and the caller's numbers (assembly/layout.ts). */
const OPTIONS = [
  ...['--optimizeLevel', '3', '--shrinkLevel', '0', '--converge', '--noAssert'],
  ...['--runtime', 'stub', '--enable', 'simd', '--initialMemory', '2'],
]

/**
 * Compiles core/kernel/assembly.
 *
 * @returns {Promise<Uint8Array>} the WebAssembly module.
 * @throws {Error} with the compiler's text.
 */
export async function compileModule() {
  /** @type {Uint8Array | null} */
  let binary = null
  const { error, stderr } = await main(
    ['assembly/index.ts', '--baseDir', ROOM, '--outFile', 'kernel.wasm', ...OPTIONS],
    {
      writeFile(name, contents) {
        if (name.endsWith('.wasm') && typeof contents !== 'string') binary = contents
      },
    },
  )
  if (error !== null || binary === null) throw new Error(`AssemblyScript: ${stderr.toString()}`)
  return binary
}

/** core/kernel/kernelModule.ts as text. @param {Uint8Array} binary */
export function moduleSource(binary) {
  return `/** Made by build/generate-kernel.mjs from core/kernel/assembly: do not edit. The WebAssembly module, as base64. */
export const KERNEL_MODULE =
  '${Buffer.from(binary).toString('base64')}'
`
}
