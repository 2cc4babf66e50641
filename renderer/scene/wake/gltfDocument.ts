/**
 * Triangle meshes as one glTF 2.0 file: JSON with its numbers in an embedded buffer, little endian as glTF wants them.
 *
 * Source: Khronos Group, glTF 2.0 Specification, chapters Concepts ("Data Alignment", "Accessors Bounds") and Geometry
 * ("Meshes").
 */

/** A mesh of a single colour, not shiny. Lengths in metres. */
export interface GltfMesh {
  readonly name: string
  /** x y z of each vertex. */
  readonly positions: Float32Array
  /** Unit normals, x y z of each vertex. */
  readonly normals: Float32Array
  /** Three vertices a triangle, counter-clockwise seen from outside. */
  readonly indices: Uint32Array
  /** Linear red, green and blue, 0 to 1. */
  readonly colour: readonly [number, number, number]
}

interface BufferView {
  readonly buffer: 0
  readonly byteOffset: number
  readonly byteLength: number
  readonly target: number
  readonly byteStride?: number
}

interface Accessor {
  readonly bufferView: number
  readonly componentType: number
  readonly count: number
  readonly type: 'VEC3' | 'SCALAR'
  readonly min: readonly number[]
  readonly max: readonly number[]
}

const FLOAT = 5126
const UNSIGNED_INT = 5125
const ARRAY_BUFFER = 34962
const ELEMENT_ARRAY_BUFFER = 34963
const TRIANGLES = 4

/** Every number written, a single or an unsigned integer, has four bytes: views are aligned as they follow each other. */
const WIDTH = 4

/** Text of a .gltf file: one scene, a node and a material for each mesh. @param scene name of the scene */
export function gltfText(scene: string, meshes: readonly GltfMesh[]): string {
  const asset = { version: '2.0', generator: 'Ringwright' }
  // No list may be empty and no buffer without bytes.
  if (meshes.length === 0) return `${JSON.stringify({ asset, scene: 0, scenes: [{ name: scene }] })}\n`

  const numbers = meshes.reduce((sum, mesh) => sum + 2 * mesh.positions.length + mesh.indices.length, 0)
  const bytes = new Uint8Array(WIDTH * numbers)
  const data = new DataView(bytes.buffer)
  const bufferViews: BufferView[] = []
  const accessors: Accessor[] = []
  let end = 0

  /** Number of the accessor. */
  function add(values: Float32Array | Uint32Array, parts: 1 | 3): number {
    const byteOffset = end
    for (const value of values) {
      if (values instanceof Float32Array) data.setFloat32(end, value, true)
      else data.setUint32(end, value, true)
      end += WIDTH
    }
    const view = { buffer: 0, byteOffset, byteLength: end - byteOffset } as const
    bufferViews.push(
      parts === 3
        ? { ...view, target: ARRAY_BUFFER, byteStride: WIDTH * parts }
        : { ...view, target: ELEMENT_ARRAY_BUFFER },
    )
    accessors.push({
      bufferView: bufferViews.length - 1,
      componentType: values instanceof Float32Array ? FLOAT : UNSIGNED_INT,
      count: values.length / parts,
      type: parts === 3 ? 'VEC3' : 'SCALAR',
      ...extent(values, parts),
    })
    return accessors.length - 1
  }

  const written = meshes.map(({ name, positions, normals, indices }, material) => ({
    name,
    primitives: [
      {
        mode: TRIANGLES,
        attributes: { POSITION: add(positions, 3), NORMAL: add(normals, 3) },
        indices: add(indices, 1),
        material,
      },
    ],
  }))
  const document = {
    asset,
    scene: 0,
    scenes: [{ name: scene, nodes: meshes.map((_, node) => node) }],
    nodes: meshes.map(({ name }, mesh) => ({ name, mesh })),
    meshes: written,
    materials: meshes.map(({ colour }) => ({
      pbrMetallicRoughness: { baseColorFactor: [...colour, 1], metallicFactor: 0, roughnessFactor: 1 },
    })),
    accessors,
    bufferViews,
    buffers: [{ byteLength: bytes.length, uri: `data:application/octet-stream;base64,${base64(bytes)}` }],
  }
  return `${JSON.stringify(document)}\n`
}

/** Least and greatest of each part, as glTF wants them: exactly those of the numbers written. */
function extent(values: Float32Array | Uint32Array, parts: number): { min: readonly number[]; max: readonly number[] } {
  const min = Array.from({ length: parts }, () => Infinity)
  const max = Array.from({ length: parts }, () => -Infinity)
  values.forEach((value, i) => {
    const part = i % parts
    min[part] = Math.min(min[part] ?? Infinity, value)
    max[part] = Math.max(max[part] ?? -Infinity, value)
  })
  return { min, max }
}

/** In pieces of whole threes, as many as a call takes as arguments. */
const PIECE = 3 * 4096

function base64(bytes: Uint8Array): string {
  let text = ''
  for (let i = 0; i < bytes.length; i += PIECE) text += btoa(String.fromCharCode(...bytes.subarray(i, i + PIECE)))
  return text
}
