/**
 * npm runs a script through a shell. Told to end, it ends the shell and no more, so that the script would run on with nobody to end it.
 */

/** How often the parent is looked for [ms]. */
const LOOK_EVERY = 300

/**
 * Started by npm, this process gets the signal to end, SIGTERM, when what started it is gone. Started by hand, it is left alone: who
 * starts a program in the background and leaves means it to go on.
 */
export function endWithParent() {
  if (process.env['npm_lifecycle_event'] === undefined) return
  const parent = process.ppid
  const look = setInterval(() => {
    if (process.ppid === parent && isRunning(parent)) return
    clearInterval(look)
    process.kill(process.pid, 'SIGTERM')
  }, LOOK_EVERY)
  look.unref()
}

/** Windows keeps the number of a parent that has ended. @param {number} pid @returns {boolean} */
function isRunning(pid) {
  try {
    return process.kill(pid, 0)
  } catch (error) {
    return !(error instanceof Error && 'code' in error && error.code === 'ESRCH')
  }
}
