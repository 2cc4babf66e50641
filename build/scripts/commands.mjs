/** Other programs, run without a shell so that no name with a space or a sign is taken apart. */
import { spawn } from 'node:child_process'
import { ROOT } from './root.mjs'

/**
 * @typedef {object} Outcome
 * @property {number} code exit code; 1 when the program ended by a signal or could not be started
 * @property {string} output what it wrote, both streams; '' when it wrote to ours
 */

/**
 * @param {string} program @param {readonly string[]} list
 * @param {{ show?: boolean, env?: NodeJS.ProcessEnv, shell?: boolean }} [options] show: let it write to standard error
 * @returns {Promise<Outcome>}
 */
export function runCommand(program, list, options = {}) {
  return new Promise((resolve) => {
    const child = spawn(program, [...list], {
      cwd: ROOT,
      env: options.env ?? process.env,
      shell: options.shell ?? false,
      stdio: options.show ? ['ignore', 2, 2] : ['ignore', 'pipe', 'pipe'],
    })
    let output = ''
    child.stdout?.on('data', (/** @type {Buffer} */ data) => (output += data.toString()))
    child.stderr?.on('data', (/** @type {Buffer} */ data) => (output += data.toString()))
    child.once('error', (error) => resolve({ code: 1, output: `${output}${error.message}\n` }))
    child.once('close', (code) => resolve({ code: code ?? 1, output }))
  })
}

/** A script of an installed package with this Node. @param {string} script @param {readonly string[]} list */
export function nodeCommand(script, list) {
  return /** @type {const} */ ({ program: process.execPath, list: [script, ...list] })
}

/** npm with this Node where it tells its own place, else the one on the path. @param {readonly string[]} list */
export function npmCommand(list) {
  const npm = process.env['npm_execpath']
  if (npm !== undefined && /\.[cm]?js$/.test(npm))
    return { program: process.execPath, list: [npm, ...list], shell: false }
  // On Windows npm is a command file, which only a shell starts; the words given here have no spaces.
  return { program: 'npm', list: [...list], shell: process.platform === 'win32' }
}
