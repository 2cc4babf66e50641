/**
 * A folder that looks like an unpacked Electron to the packager, and is none: enough to pack, to flip fuses in, and to read back.
 */
import { chmod, mkdir, writeFile } from 'node:fs/promises'
import path from 'node:path'

/** What marks the fuses inside the runtime, as @electron/fuses looks for it. */
const SENTINEL = 'dL7pKGdnNz796PbbjQWNKmHXBZaB9tsX'
/** Fuses as Electron ships them: '1' on, '0' off, in the order of its documentation; the ninth is newer than our packager. */
export const SHIPPED_FUSES = '101100101'

/** Make the folder. @param version of Electron that it pretends to be */
export async function makeStubRuntime(folder: string, version: string): Promise<void> {
  await mkdir(path.join(folder, 'locales'), { recursive: true })
  await mkdir(path.join(folder, 'resources'))
  const wire = Buffer.concat([
    Buffer.from(SENTINEL),
    Buffer.from([1, SHIPPED_FUSES.length]),
    Buffer.from(SHIPPED_FUSES),
  ])
  const executable = path.join(folder, 'electron')
  await writeFile(executable, Buffer.concat([Buffer.alloc(512), wire, Buffer.alloc(512)]))
  await chmod(executable, 0o755)
  await writeFile(path.join(folder, 'version'), version)
  await writeFile(path.join(folder, 'LICENSE'), 'Electron’s terms')
  await writeFile(path.join(folder, 'LICENSES.chromium.html'), 'Chromium’s terms')
  for (const language of ['en-US', 'de']) await writeFile(path.join(folder, 'locales', `${language}.pak`), language)
}
