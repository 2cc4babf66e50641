/** Window or browser: which face npm start shows, and why. */

/**
 * @typedef {object} Surroundings
 * @property {string} platform as process.platform
 * @property {Readonly<Record<string, string | undefined>>} env
 * @property {boolean} root true when the user is the superuser
 */

/** True where a window can be shown. @param {Surroundings} surroundings */
export function hasDisplay({ platform, env }) {
  if (platform === 'darwin' || platform === 'win32') return true
  return [env['DISPLAY'], env['WAYLAND_DISPLAY']].some((name) => name !== undefined && name !== '')
}

/**
 * Why the desktop window cannot be opened here, before its runtime is looked for; null when nothing speaks against it.
 *
 * @param {Surroundings} surroundings @returns {string | null}
 */
export function obstacleToWindow(surroundings) {
  if (!hasDisplay(surroundings)) return 'there is no display (DISPLAY and WAYLAND_DISPLAY are not set)'
  if (surroundings.platform === 'linux' && surroundings.root)
    return 'its sandbox does not run for the superuser, and it does not run without its sandbox'
  return null
}

/** The one sentence. @param {string} obstacle */
export function obstacleSentence(obstacle) {
  return `The desktop window cannot be opened because ${obstacle}, so the program opens in the browser.`
}

/**
 * Command that opens an address in the user's browser, null where there is nothing to show it on.
 *
 * @param {Surroundings} surroundings @param {string} address @returns {{ program: string, list: string[] } | null}
 */
export function openCommand(surroundings, address) {
  if (surroundings.platform === 'darwin') return { program: 'open', list: [address] }
  if (surroundings.platform === 'win32') return { program: 'cmd', list: ['/c', 'start', '""', address] }
  return hasDisplay(surroundings) ? { program: 'xdg-open', list: [address] } : null
}
