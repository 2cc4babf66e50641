import { Mesh, MeshStandardMaterial, type BufferAttribute, type InterleavedBufferAttribute } from 'three'
import { GLTFLoader } from 'three/examples/jsm/loaders/GLTFLoader.js'
import { describe, expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { gltfText, type GltfMesh } from '../../../../renderer/scene/wake/gltfDocument'

/** A triangle and a square, of different sizes, so that a shifted offset shows. */
const MESHES: readonly GltfMesh[] = [
  {
    name: 'triangle',
    positions: Float32Array.of(0, 0, 0, 0.1, 0, 0, 0, -0.2, 0.3),
    normals: Float32Array.of(0, 0, 1, 0, 1, 0, 1, 0, 0),
    indices: Uint32Array.of(0, 1, 2),
    colour: [0.25, 0.5, 1],
  },
  {
    name: 'square',
    positions: Float32Array.of(-1, -1, 7, 1, -1, 7, 1, 1, 7, -1, 1, 7),
    normals: Float32Array.of(0, 0, 1, 0, 0, 1, 0, 0, 1, 0, 0, 1),
    indices: Uint32Array.of(0, 1, 2, 0, 2, 3),
    colour: [0, 0, 0],
  },
]

interface Written {
  readonly scenes: readonly { readonly name: string; readonly nodes?: readonly number[] }[]
  readonly nodes: readonly { readonly name: string; readonly mesh: number }[]
  readonly meshes: readonly {
    readonly primitives: readonly {
      readonly mode: number
      readonly attributes: { readonly POSITION: number; readonly NORMAL: number }
      readonly indices: number
      readonly material: number
    }[]
  }[]
  readonly materials: readonly unknown[]
  readonly accessors: readonly {
    readonly bufferView: number
    readonly componentType: number
    readonly count: number
    readonly type: string
    readonly min: readonly number[]
    readonly max: readonly number[]
  }[]
  readonly bufferViews: readonly {
    readonly buffer: number
    readonly byteOffset: number
    readonly byteLength: number
    readonly byteStride?: number
    readonly target: number
  }[]
  readonly buffers: readonly { readonly byteLength: number; readonly uri: string }[]
}

function read(text: string): { readonly document: Written; readonly bytes: Buffer } {
  const document: Written = JSON.parse(text)
  const [head, body = ''] = at(document.buffers, 0).uri.split(',')
  expect(head).toBe('data:application/octet-stream;base64')
  return { document, bytes: Buffer.from(body, 'base64') }
}

/** Numbers of an accessor, read from the bytes by the document's own description of them. */
function numbersOf({ document, bytes }: ReturnType<typeof read>, number: number): readonly number[] {
  const { bufferView, componentType, count, type } = at(document.accessors, number)
  const { byteOffset, byteStride } = at(document.bufferViews, bufferView)
  const parts = type === 'VEC3' ? 3 : 1
  return Array.from({ length: count * parts }, (_, i) => {
    const place = byteOffset + Math.floor(i / parts) * (byteStride ?? 4 * parts) + 4 * (i % parts)
    return componentType === 5126 ? bytes.readFloatLE(place) : bytes.readUInt32LE(place)
  })
}

// Rules of the glTF 2.0 Specification (Khronos Group): "Data Alignment", "Accessors Bounds" and "Meshes".
describe('a glTF document', () => {
  it('has views that are aligned, follow each other and fill the buffer', () => {
    const { document, bytes } = read(gltfText('things', MESHES))
    expect(bytes.length).toBe(at(document.buffers, 0).byteLength)
    let end = 0
    for (const view of document.bufferViews) {
      expect(view.byteOffset).toBe(end)
      expect(view.byteOffset % 4).toBe(0)
      expect(view.byteLength).toBeGreaterThan(0)
      end += view.byteLength
    }
    expect(end).toBe(bytes.length)
  })

  it('has accessors that fit their views, with the limits of the numbers in them', () => {
    const file = read(gltfText('things', MESHES))
    file.document.accessors.forEach((accessor, number) => {
      const parts = accessor.type === 'VEC3' ? 3 : 1
      const view = at(file.document.bufferViews, accessor.bufferView)
      expect(view.byteLength).toBe(4 * parts * accessor.count)
      const numbers = numbersOf(file, number)
      for (let part = 0; part < parts; part += 1) {
        const column = numbers.filter((_, i) => i % parts === part)
        expect(accessor.min[part]).toBe(Math.min(...column))
        expect(accessor.max[part]).toBe(Math.max(...column))
      }
    })
  })

  it('has triangles whose vertices are all there, and the numbers that were given', () => {
    const file = read(gltfText('things', MESHES))
    const { document } = file
    expect(document.scenes).toEqual([{ name: 'things', nodes: [0, 1] }])
    document.nodes.forEach(({ name, mesh }, number) => {
      const given = at(MESHES, number)
      expect(name).toBe(given.name)
      const { mode, attributes, indices } = at(at(document.meshes, mesh).primitives, 0)
      expect(mode).toBe(4)
      const view = (accessor: number) => at(document.bufferViews, at(document.accessors, accessor).bufferView)
      expect(view(attributes.POSITION)).toMatchObject({ target: 34962, byteStride: 12 })
      expect(view(attributes.NORMAL)).toMatchObject({ target: 34962, byteStride: 12 })
      expect(view(indices).target).toBe(34963)
      // An index is not strided.
      expect(view(indices).byteStride).toBeUndefined()
      expect(numbersOf(file, attributes.POSITION)).toEqual([...given.positions])
      expect(numbersOf(file, attributes.NORMAL)).toEqual([...given.normals])
      expect(numbersOf(file, indices)).toEqual([...given.indices])
      expect(Math.max(...numbersOf(file, indices))).toBeLessThan(at(document.accessors, attributes.POSITION).count)
    })
  })

  it('longer than one piece of base64 is whole', () => {
    const positions = Float32Array.from({ length: 3 * 5000 }, (_, i) => Math.sin(i))
    const indices = Uint32Array.from({ length: 3 * 5000 }, (_, i) => i % 5000)
    const file = read(gltfText('long', [{ name: 'long', positions, normals: positions, indices, colour: [1, 1, 1] }]))
    expect(file.bytes.length).toBe(4 * 3 * 15000)
    expect(numbersOf(file, 0)).toEqual([...positions])
    expect(numbersOf(file, 2)).toEqual([...indices])
  })

  it('without meshes has no empty list', () => {
    expect(JSON.parse(gltfText('nothing', []))).toEqual({
      asset: { version: '2.0', generator: 'Ringwright' },
      scene: 0,
      scenes: [{ name: 'nothing' }],
    })
  })

  it('is read by another implementation as the meshes that were written', async () => {
    const { scene } = await new GLTFLoader().parseAsync(gltfText('things', MESHES), '')
    expect(scene.name).toBe('things')
    expect(scene.children.map(({ name }) => name)).toEqual(['triangle', 'square'])
    scene.children.forEach((mesh, number) => {
      if (!(mesh instanceof Mesh) || !(mesh.material instanceof MeshStandardMaterial)) throw new Error('not a mesh')
      const given = at(MESHES, number)
      expect(listOf(mesh.geometry.getAttribute('position'))).toEqual([...given.positions])
      expect(listOf(mesh.geometry.getAttribute('normal'))).toEqual([...given.normals])
      expect([...(mesh.geometry.getIndex()?.array ?? [])]).toEqual([...given.indices])
      const { color, roughness, metalness } = mesh.material
      expect([color.r, color.g, color.b]).toEqual(given.colour)
      expect([roughness, metalness]).toEqual([1, 0])
    })
  })
})

function listOf(attribute: BufferAttribute | InterleavedBufferAttribute): readonly number[] {
  return Array.from({ length: attribute.count }, (_, i) => [0, 1, 2].map((k) => attribute.getComponent(i, k))).flat()
}
