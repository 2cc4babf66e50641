/** Folder of the project, wherever it was started from. */
import path from 'node:path'
import { fileURLToPath } from 'node:url'

export const ROOT = fileURLToPath(new URL('../..', import.meta.url)).replace(/[\\/]$/, '')
export const DIST = path.join(ROOT, 'dist')

/** @param {...string} parts @returns {string} path of a file of the project */
export function inProject(...parts) {
  return path.join(ROOT, ...parts)
}

/** Say something that is not the program's output. @param {string} text */
export function tell(text) {
  process.stderr.write(`${text}\n`)
}
