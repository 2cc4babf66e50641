/**
 * npm start: installs what is missing, builds what is stale, and opens the program: the desktop window where it can, else
 * the same program in the browser. Runs before anything is installed, so it uses Node alone.
 */
import { spawn } from 'node:child_process'
import path from 'node:path'
import { ensureBuilt } from './scripts/bundle.mjs'
import { electronExecutable, fetchElectron } from './scripts/electronRuntime.mjs'
import { obstacleSentence, obstacleToWindow, openCommand } from './scripts/face.mjs'
import { ensureInstalled } from './scripts/install.mjs'
import { endWithParent } from './scripts/parent.mjs'
import { DIST, ROOT, tell } from './scripts/root.mjs'
import { readStartArguments } from './scripts/startArguments.mjs'

/** A window that ends with a failure sooner than this never came up [ms]. */
const WINDOW_GRACE = 5000

/** What ends the program from outside. @type {readonly NodeJS.Signals[]} */
const SIGNALS = ['SIGINT', 'SIGTERM']

const SURROUNDINGS = { platform: process.platform, env: process.env, root: process.getuid?.() === 0 }

endWithParent()
const reading = readStartArguments(process.argv.slice(2))
if (reading.ok) {
  await start(reading.request).catch((error) => {
    tell(error instanceof Error ? error.message : String(error))
    process.exitCode = 1
  })
} else {
  tell(reading.message)
  process.exitCode = 2
}

/** @param {import('./scripts/startArguments.mjs').StartRequest} request */
async function start(request) {
  await ensureInstalled()
  await ensureBuilt(['app', 'renderer'])
  if (!request.browser) {
    const obstacle = await openWindow()
    if (obstacle === null) return
    tell(obstacleSentence(obstacle))
  }
  await serve(request)
}

/** @returns {Promise<string | null>} why the window could not be opened; null once it was and has been closed again */
async function openWindow() {
  const obstacle = obstacleToWindow(SURROUNDINGS)
  if (obstacle !== null) return obstacle
  const executable = electronExecutable() ?? (await fetchElectron())
  if (executable === null) return 'its runtime, Electron, is not installed and could not be fetched'
  const started = Date.now()
  const child = spawn(executable, [ROOT], { stdio: 'inherit' })
  /** @param {NodeJS.Signals} signal */
  const end = (signal) => child.kill(signal)
  for (const signal of SIGNALS) process.on(signal, end)
  const code = await new Promise((resolve) => {
    child.once('error', () => resolve(1))
    child.once('close', (exit) => resolve(exit ?? 0))
  })
  for (const signal of SIGNALS) process.off(signal, end)
  if (code !== 0 && Date.now() - started < WINDOW_GRACE) return `its runtime ended at once with exit code ${code}`
  process.exitCode = code
  return null
}

/** @param {import('./scripts/startArguments.mjs').StartRequest} request */
async function serve({ port, open }) {
  const { startServer } = await import(new URL('../dist/app/serve.mjs', import.meta.url).href)
  const server = await startServer({ root: path.join(DIST, 'renderer'), port })
  if (server.moved) tell(`Port ${port} is in use, so a free one was taken.`)
  process.stdout.write(`Ringwright is at ${server.address} (Ctrl+C ends it).\n`)
  if (open) openQuietly(server.address)
  const end = () => server.close().then(() => process.exit(0))
  for (const signal of SIGNALS) process.once(signal, end)
}

/** @param {string} address */
function openQuietly(address) {
  const command = openCommand(SURROUNDINGS, address)
  if (command === null) return
  const child = spawn(command.program, command.list, { stdio: 'ignore', detached: true })
  child.once('error', () => undefined)
  child.unref()
}
