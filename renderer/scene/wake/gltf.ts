/**
 * Rings as meshes for other programs: glTF 2.0 in JSON, lengths in metres, y up.
 */
import { BufferAttribute, BufferGeometry, Color, Mesh, MeshStandardMaterial, Scene } from 'three'
import type { RingShape } from '../../../core/filament'
import { paint } from '../drawing'
import { writeTube, writeTubeIndex } from './tubes'

const SIDES = 16

/** One mesh a ring, a tube of its true core radius, named by its number. @param colourOf colour of a ring by number */
export function ringMeshes(shapes: readonly RingShape[], colourOf: (ring: number) => string): Scene {
  const scene = new Scene()
  scene.name = 'wake'
  for (const { nodes, coreRadius, number } of shapes) {
    const count = nodes.length / 3
    const positions = new Float32Array(3 * count * SIDES)
    const normals = new Float32Array(3 * count * SIDES)
    const index = new Uint32Array(6 * count * SIDES)
    writeTube(positions, normals, 0, nodes, coreRadius, SIDES)
    writeTubeIndex(index, 0, 0, count, SIDES)
    const geometry = new BufferGeometry()
    geometry.setAttribute('position', new BufferAttribute(positions, 3))
    geometry.setAttribute('normal', new BufferAttribute(normals, 3))
    geometry.setIndex(new BufferAttribute(index, 1))
    const colour = new Color()
    paint(colour, colourOf(number))
    const mesh = new Mesh(geometry, new MeshStandardMaterial({ color: colour, roughness: 1, metalness: 0 }))
    mesh.name = `ring ${number}`
    scene.add(mesh)
  }
  return scene
}

/** Text of the .gltf file. The writer is fetched when it is first wanted. @throws {Error} where it cannot write */
export async function ringsToGltf(shapes: readonly RingShape[], colourOf: (ring: number) => string): Promise<string> {
  const { GLTFExporter } = await import('three/examples/jsm/exporters/GLTFExporter.js')
  const scene = ringMeshes(shapes, colourOf)
  const written = await new GLTFExporter().parseAsync(scene, { binary: false })
  scene.traverse((part) => {
    if (part instanceof Mesh) part.geometry.dispose()
  })
  return `${JSON.stringify(written)}\n`
}
