import { afterEach, describe, expect, it, vi } from 'vitest'
import { base64Bytes, base64Doubles } from '../../../core/kernel/base64'

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

  it('decodes doubles from their planes of bytes, interval by interval', () => {
    const values = Float64Array.of(0, -1.5, 1e-300, Math.PI, Infinity, 2)
    const view = new DataView(new ArrayBuffer(48))
    values.forEach((value, i) => view.setFloat64(8 * i, value, true))
    // Two coefficients an interval: the first of every interval stand before the second ones in each plane.
    const order = [0, 2, 4, 1, 3, 5]
    const planes = Array.from({ length: 8 }, (_, plane) => order.map((i) => view.getUint8(8 * i + plane))).flat()
    expect(base64Doubles(Buffer.from(planes).toString('base64'), 2)).toEqual(values)
  })
})
