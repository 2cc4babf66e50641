/**
 * What the program calls itself. The version comes from package.json at build time.
 */
declare const __RINGWRIGHT_VERSION__: string

/** The name systems know it by, the same as in the packages; Windows goes by it for its task bar. */
export const PROGRAM_ID = 'ringwright.desktop'

export const PROGRAM = { name: 'Ringwright', version: __RINGWRIGHT_VERSION__ } as const
