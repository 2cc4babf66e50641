/** A document as JSON holds it, before and beside its decoded form. */

/** Anything JSON can hold. */
export type Json = null | boolean | number | string | readonly Json[] | JsonObject
export interface JsonObject {
  readonly [key: string]: Json
}
