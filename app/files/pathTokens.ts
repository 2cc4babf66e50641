/**
 * Files the user chose, known to the page by a token that says nothing about where they lie.
 */
export interface PathTokens {
  /** The token of a path, the same one each time. */
  tokenOf(filePath: string): string
  /** The path behind a token; null when it was never given out. */
  pathOf(token: string): string | null
}

/** @param newToken makes a text that cannot be guessed and does not repeat */
export function createPathTokens(newToken: () => string): PathTokens {
  const paths = new Map<string, string>()
  const tokens = new Map<string, string>()
  return {
    tokenOf(filePath) {
      const known = tokens.get(filePath)
      if (known !== undefined) return known
      const token = newToken()
      tokens.set(filePath, token)
      paths.set(token, filePath)
      return token
    },
    pathOf: (token) => paths.get(token) ?? null,
  }
}
