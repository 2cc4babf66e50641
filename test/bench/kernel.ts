import { execFile } from 'node:child_process'
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { fileURLToPath } from 'node:url'
import { promisify } from 'node:util'
import { bundled } from './kernelBundle'
import type { Figure } from './measure'

/**
 * The figures of the kernel, measured by kernelMeasure.ts in a process of its own and bundled as the program ships: a
 * loader's stand-ins for imports, and what the engine has compiled before, would change what is measured.
 *
 * @throws {Error} when implementations that must agree do not.
 */
export async function kernelBench(): Promise<readonly Figure[]> {
  const folder = await mkdtemp(path.join(tmpdir(), 'ringwright-bench-'))
  try {
    const [program, thread] = [path.join(folder, 'measure.mjs'), path.join(folder, 'thread.cjs')]
    await writeFile(program, await bundled('./kernelMeasure.ts', 'es'))
    await writeFile(thread, await bundled('./kernelThread.ts', 'cjs'))
    const source = fileURLToPath(new URL('./kernel.c', import.meta.url))
    const { stdout } = await promisify(execFile)(process.execPath, [program, thread, source], { encoding: 'utf8' })
    const figures: readonly Figure[] = JSON.parse(stdout)
    return figures
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}
