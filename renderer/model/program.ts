/** The program by name and version, as files and documents that leave it say. */
declare const __RINGWRIGHT_VERSION__: string

export const PROGRAM = `Ringwright ${__RINGWRIGHT_VERSION__}`
