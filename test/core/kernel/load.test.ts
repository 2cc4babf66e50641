import { afterEach, describe, expect, it, vi } from 'vitest'
import { base64Bytes } from '../../../core/kernel/base64'

afterEach(() => {
  vi.unstubAllGlobals()
  vi.resetModules()
})

/** A fresh copy of the room, in which nothing has been loaded yet. */
async function fresh(): Promise<typeof import('../../../core/kernel')> {
  vi.resetModules()
  return await import('../../../core/kernel')
}

describe('loadKernel', () => {
  it('gives the WebAssembly kernel, the same at each call', async () => {
    const room = await fresh()
    const kernel = await room.loadKernel()
    expect(kernel.name).toBe('wasm')
    expect(await room.loadKernel()).toBe(kernel)
  })

  it('falls back on TypeScript where WebAssembly is missing', async () => {
    vi.stubGlobal('WebAssembly', undefined)
    const room = await fresh()
    expect(await room.loadKernel()).toBe(room.typescriptKernel)
  })

  it('falls back on TypeScript where a policy or an old engine refuses the module', async () => {
    vi.stubGlobal('WebAssembly', { compile: () => Promise.reject(new Error('refused by the policy')) })
    const room = await fresh()
    expect((await room.loadKernel()).name).toBe('typescript')
  })
})

describe('base64', () => {
  it('decodes any bytes, with each padding', () => {
    for (let length = 0; length < 70; length++) {
      const bytes = Uint8Array.from({ length }, (_, i) => (i * 97 + length * 31) & 255)
      expect([...base64Bytes(Buffer.from(bytes).toString('base64'))]).toEqual([...bytes])
    }
  })
})
