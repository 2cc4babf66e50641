/**
 * The three-dimensional drawing of one pulse: its bodies and lines.
 */
import { BufferGeometry, DoubleSide, Mesh, MeshBasicMaterial, MeshLambertMaterial } from 'three'
import type { DrawingColours, PulseSceneModel } from '../../core/report'
import { createDrawing, mattFactor, paint } from './drawing'
import { createRingMesh, fillBody, fillNozzle } from './meshes'
import { createRibbons } from './ribbons'
import { sceneStrokes } from './strokes'
import type { Stage } from './useStage'
import { basisOf } from './view'

export interface PulseDrawing extends Stage {
  setModel(model: PulseSceneModel): void
}

/**
 * @param antialias multisampling, off where the processor draws
 * @throws {Error} when the machine gives no WebGL 2 context.
 */
export function createStage(canvas: HTMLCanvasElement, antialias: boolean): PulseDrawing {
  const drawing = createDrawing(canvas, antialias)
  const ringMaterial = new MeshLambertMaterial()
  const nozzleMaterial = new MeshLambertMaterial({ side: DoubleSide })
  const waterMaterial = new MeshLambertMaterial({ transparent: true, opacity: 0.34, depthWrite: false })
  const lineMaterial = new MeshBasicMaterial({ vertexColors: true, side: DoubleSide })
  const overMaterial = new MeshBasicMaterial({
    vertexColors: true,
    side: DoubleSide,
    depthTest: false,
    transparent: true,
  })
  drawing.own(ringMaterial, nozzleMaterial, waterMaterial, lineMaterial, overMaterial)

  const ring = createRingMesh()
  const ringMesh = new Mesh(ring.geometry, ringMaterial)
  const nozzleMesh = new Mesh(new BufferGeometry(), nozzleMaterial)
  const slugMesh = new Mesh(new BufferGeometry(), waterMaterial)
  const jetMesh = new Mesh(new BufferGeometry(), waterMaterial)
  const lines = createRibbons()
  const over = createRibbons()
  const lineMesh = new Mesh(lines.geometry, lineMaterial)
  const overMesh = new Mesh(over.geometry, overMaterial)
  slugMesh.renderOrder = 1
  jetMesh.renderOrder = 1
  overMesh.renderOrder = 2
  for (const mesh of [ringMesh, nozzleMesh, slugMesh, jetMesh, lineMesh, overMesh]) {
    mesh.frustumCulled = false
    drawing.scene.add(mesh)
    drawing.own(mesh.geometry)
  }

  let shown: PulseSceneModel | null = null
  let colours: DrawingColours | null = null

  return {
    setModel(model) {
      shown = model
      ringMesh.visible = model.ring !== null
      if (model.ring !== null) ring.shape(model.ring.core)
      fillNozzle(nozzleMesh.geometry, model.nozzle)
      fillBody(slugMesh.geometry, model.slug.outline)
      const jet = model.trailingJet
      jetMesh.visible = jet !== null
      if (jet !== null) {
        const r = jet.diameter / 2
        fillBody(jetMesh.geometry, [
          { x: 0, r },
          { x: jet.length, r },
        ])
      }
    },
    setColours(next) {
      colours = next
      paint(ringMaterial.color, next.accent)
      ringMaterial.color.multiplyScalar(mattFactor(next))
      paint(waterMaterial.color, next.accent)
      paint(nozzleMaterial.color, next.nozzle)
      drawing.setGround(next.ground)
    },
    setSize: drawing.setSize,
    draw(view) {
      if (shown === null || colours === null) return
      const basis = basisOf(view)
      const perPixel = 1 / view.scale
      const strokes = sceneStrokes(shown, basis, perPixel)
      lines.draw(
        strokes.filter((stroke) => !stroke.over),
        basis,
        perPixel,
        colours,
      )
      over.draw(
        strokes.filter((stroke) => stroke.over),
        basis,
        perPixel,
        colours,
      )
      const { xMin, xMax, rMax } = shown.extent
      drawing.render(view, 4 * (Math.max(Math.abs(xMin), Math.abs(xMax)) + rMax))
    },
    whenDrawn: drawing.whenDrawn,
    dispose: drawing.dispose,
  }
}
