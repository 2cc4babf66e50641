/** Facts about the machine the window needs for its words. */

/** True on Apple's systems, where commands are under the Cmd key. */
export function isMac(userAgent: string = globalThis.navigator?.userAgent ?? ''): boolean {
  return /Mac|iPhone|iPad/u.test(userAgent)
}
