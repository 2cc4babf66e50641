/**
 * npm run pack: packages of the desktop program, into `release`. The runtime and the tools of each kind of package are fetched
 * from the network by electron-builder; with --unpacked and --runtime FOLDER nothing is.
 */
import { PACKAGING } from './electron-builder.config.mjs'
import { ensureBuilt } from './scripts/bundle.mjs'
import { ensureInstalled } from './scripts/install.mjs'
import { readPackArguments } from './scripts/packArguments.mjs'
import { ROOT, tell } from './scripts/root.mjs'

const caller = { platform: process.platform, folder: process.env['INIT_CWD'] ?? process.cwd() }
const reading = readPackArguments(process.argv.slice(2), caller)
if (reading.ok) {
  await pack(reading.request).catch((error) => {
    tell(error instanceof Error ? error.message : String(error))
    process.exitCode = 1
  })
} else {
  tell(reading.message)
  process.exitCode = 2
}

/** @param {import('./scripts/packArguments.mjs').PackRequest} request */
async function pack(request) {
  await ensureInstalled()
  await ensureBuilt(['app', 'renderer'])
  for (const file of await makePackages(request)) tell(file)
}

/** @param {import('./scripts/packArguments.mjs').PackRequest} request @returns {Promise<readonly string[]>} files made */
async function makePackages({ system, unpacked, runtime, out }) {
  const { build, Platform } = await import('electron-builder')
  const platform = { linux: Platform.LINUX, mac: Platform.MAC, windows: Platform.WINDOWS }[system]
  try {
    return await build({
      projectDir: ROOT,
      targets: platform.createTarget(unpacked ? ['dir'] : null),
      config: {
        ...PACKAGING,
        directories: { ...PACKAGING.directories, ...(out === null ? {} : { output: out }) },
        ...(runtime === null ? {} : { electronDist: runtime }),
      },
      publish: 'never',
    })
  } catch (error) {
    const [reason = ''] = (error instanceof Error ? error.message : String(error)).split('\n')
    throw new Error(
      `The packages could not be made: ${reason}\nThe runtime and the tools for each kind of package come from the network; ` +
        'where that is closed, --unpacked with --runtime FOLDER makes the folder they are made from.',
      { cause: error },
    )
  }
}
