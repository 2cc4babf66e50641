/**
 * A field on its rectangle: one texture of colours, written anew at each output time.
 */
import {
  BufferAttribute,
  BufferGeometry,
  DataTexture,
  DoubleSide,
  LinearFilter,
  Mesh,
  MeshBasicMaterial,
  SRGBColorSpace,
} from 'three'
import { fieldColour, type WakeScenePlane } from '../../../core/report'

export interface FieldPlane {
  readonly mesh: Mesh
  set(plane: WakeScenePlane): void
  show(index: number): void
  dispose(): void
}

const STEPS = 256
const OPACITY = 196

export function createFieldPlane(): FieldPlane {
  const geometry = new BufferGeometry()
  const material = new MeshBasicMaterial({ transparent: true, side: DoubleSide, depthWrite: false })
  const mesh = new Mesh(geometry, material)
  const colours = { amount: colourTable('amount'), signed: colourTable('signed') }
  let plane: WakeScenePlane | null = null
  let texture: DataTexture | null = null
  let pixels = new Uint8Array(0)
  return {
    mesh,
    set(next) {
      if (plane === next) return
      plane = next
      const { columns, rows, origin, along, across } = next
      texture?.dispose()
      pixels = new Uint8Array(4 * columns * rows)
      texture = new DataTexture(pixels, columns, rows)
      texture.colorSpace = SRGBColorSpace
      texture.magFilter = LinearFilter
      texture.minFilter = LinearFilter
      material.map = texture
      material.needsUpdate = true
      const corners = [
        [0, 0],
        [1, 0],
        [1, 1],
        [0, 1],
      ] as const
      const places = corners.flatMap(([a, b]) =>
        ([0, 1, 2] as const).map((i) => origin[i] + a * along[i] + b * across[i]),
      )
      // Values stand at nodes, texels have their colour in their middle: half a texel in from each edge.
      const texels = corners.flatMap(([a, b]) => [(0.5 + a * (columns - 1)) / columns, (0.5 + b * (rows - 1)) / rows])
      geometry.setAttribute('position', new BufferAttribute(Float32Array.from(places), 3))
      geometry.setAttribute('uv', new BufferAttribute(Float32Array.from(texels), 2))
      geometry.setIndex([0, 1, 2, 0, 2, 3])
    },
    show(index) {
      const values = plane?.values[index]
      if (plane === null || texture === null || values === undefined) return
      const table = plane.quantity === 'speed' ? colours.amount : colours.signed
      const factor = (STEPS - 1) / (plane.high - plane.low || 1)
      for (let i = 0; i < values.length; i += 1) {
        const value = values[i] ?? NaN
        const step = 3 * Math.min(STEPS - 1, Math.max(0, Math.round((value - plane.low) * factor)))
        pixels[4 * i] = table[step] ?? 0
        pixels[4 * i + 1] = table[step + 1] ?? 0
        pixels[4 * i + 2] = table[step + 2] ?? 0
        pixels[4 * i + 3] = Number.isNaN(value) ? 0 : OPACITY
      }
      texture.needsUpdate = true
    },
    dispose() {
      geometry.dispose()
      material.dispose()
      texture?.dispose()
    },
  }
}

function colourTable(map: 'amount' | 'signed'): Uint8Array {
  const table = new Uint8Array(3 * STEPS)
  for (let step = 0; step < STEPS; step += 1) table.set(fieldColour(map, step / (STEPS - 1)), 3 * step)
  return table
}
