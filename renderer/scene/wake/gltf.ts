/**
 * Rings as meshes for other programs: glTF 2.0 in JSON, lengths in metres.
 */
import type { RingShape } from '../../../core/filament'
import { colourParts } from '../../plots/themeColours'
import { gltfText, type GltfMesh } from './gltfDocument'
import { writeTube, writeTubeIndex } from './tubes'

const SIDES = 16

/** One mesh a ring, a tube of its true core radius, named by its number. @param colourOf colour of a ring by number */
export function ringMeshes(shapes: readonly RingShape[], colourOf: (ring: number) => string): readonly GltfMesh[] {
  return shapes.map(({ nodes, coreRadius, number }) => {
    const count = nodes.length / 3
    const positions = new Float32Array(3 * count * SIDES)
    const normals = new Float32Array(3 * count * SIDES)
    const indices = new Uint32Array(6 * count * SIDES)
    writeTube(positions, normals, 0, nodes, coreRadius, SIDES)
    writeTubeIndex(indices, 0, 0, count, SIDES)
    const [red, green, blue] = colourParts(colourOf(number))
    const colour = [linear(red), linear(green), linear(blue)] as const
    return { name: `ring ${number}`, positions, normals, indices, colour }
  })
}

/** Text of the .gltf file. */
export function ringsToGltf(shapes: readonly RingShape[], colourOf: (ring: number) => string): string {
  return gltfText('wake', ringMeshes(shapes, colourOf))
}

/** Linear light of a part of an sRGB colour, both 0 to 1. Source: IEC 61966-2-1; recalled, not re-read. */
function linear(part: number): number {
  return part <= 0.04045 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4
}
