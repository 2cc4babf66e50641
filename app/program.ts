/**
 * What the program calls itself. The version comes from package.json at build time.
 */
declare const __RINGWRIGHT_VERSION__: string

export const PROGRAM = { name: 'Ringwright', version: __RINGWRIGHT_VERSION__ } as const
