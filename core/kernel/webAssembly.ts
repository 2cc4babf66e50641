/** The little of WebAssembly's JavaScript interface that is used: core has no type library that declares it. */

export interface WasmMemory {
  /** Replaced when the memory grows. */
  readonly buffer: ArrayBuffer
  /** Pages of 65536 bytes. @throws {RangeError} when the engine cannot give them. */
  readonly grow: (pages: number) => number
}

interface WasmInstance {
  readonly exports: Readonly<Record<string, unknown>>
}

interface WasmInterface {
  readonly compile: (bytes: Uint8Array<ArrayBuffer>) => Promise<object>
  readonly instantiate: (module: object, imports: Readonly<Record<string, unknown>>) => Promise<WasmInstance>
}

declare const WebAssembly: WasmInterface | undefined

/**
 * Compiles and starts a module that imports nothing it needs.
 *
 * @returns its exports, or null where WebAssembly is missing, forbidden by the page's policy, or lacks what is used.
 */
export async function startModule(bytes: Uint8Array<ArrayBuffer>): Promise<Readonly<Record<string, unknown>> | null> {
  if (typeof WebAssembly === 'undefined') return null
  try {
    const module = await WebAssembly.compile(bytes)
    return (await WebAssembly.instantiate(module, {})).exports
  } catch {
    return null
  }
}
