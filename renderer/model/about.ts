/**
 * What the program says of itself: its version, and the notices of everything it holds, from the file built beside the page.
 */
declare const __RINGWRIGHT_VERSION__: string

export const VERSION: string = __RINGWRIGHT_VERSION__

/** Made beside the page by the build. */
const NOTICES = './notices.txt'
/** The rule that stands above the title of each part. */
const RULE = /^={20,}$/m

export interface Notice {
  readonly title: string
  readonly text: string
}

/** @returns the notices, or a sentence that says why they cannot be shown */
export async function readNotices(load: typeof fetch = fetch): Promise<readonly Notice[] | string> {
  try {
    const response = await load(NOTICES)
    const notices = response.ok ? noticesIn(await response.text()) : []
    if (notices.length > 0) return notices
  } catch {
    // The server of the page is gone.
  }
  return 'The notices could not be read. They are made when the program is built, and lie beside its page as notices.txt.'
}

/** The parts of the notices file; none where it is not one. */
export function noticesIn(text: string): readonly Notice[] {
  const [, ...parts] = text.split(RULE)
  return parts.map((part) => {
    const [title = '', ...rest] = part.trim().split('\n')
    return { title, text: rest.join('\n').trim() }
  })
}
