/** The command line of npm start. */

/** Port the browser face asks for first, so that its address, and what the page remembers there, stays the same. */
export const USUAL_PORT = 5417

/**
 * @typedef {{ readonly browser: boolean, readonly open: boolean, readonly port: number }} StartRequest
 * @typedef {{ readonly ok: true, readonly request: StartRequest } | { readonly ok: false, readonly message: string }} StartReading
 */

export const START_USAGE = 'npm start -- [--browser] [--port N] [--no-open]'

/** @param {readonly string[]} list @returns {StartReading} */
export function readStartArguments(list) {
  let request = { browser: false, open: true, port: USUAL_PORT }
  const rest = [...list]
  for (let word = rest.shift(); word !== undefined; word = rest.shift()) {
    const [name = '', joined] = word.split('=', 2)
    if (word === '--browser') request = { ...request, browser: true }
    else if (word === '--no-open') request = { ...request, open: false }
    else if (name === '--port') {
      const text = joined ?? rest.shift() ?? ''
      const port = /^\d{1,5}$/.test(text) ? Number(text) : NaN
      if (!(port <= 65535)) {
        const given = text === '' ? 'nothing' : text
        return {
          ok: false,
          message: `--port must be a whole number from 0 to 65535 (0 takes a free port), got ${given}.`,
        }
      }
      request = { ...request, browser: true, port }
    } else return { ok: false, message: `${word} is not an argument of npm start. Use: ${START_USAGE}` }
  }
  return { ok: true, request }
}
