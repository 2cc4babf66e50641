/** Sizes above which a file or a request is refused before it is read. */

/** Cap on a plan, a table or an export [bytes]. */
export const MAXIMUM_FILE_BYTES = 50 * 1024 * 1024
export const MAXIMUM_FILE_TEXT = '50 MB'
