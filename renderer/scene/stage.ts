/**
 * The three-dimensional drawing on its canvas: bodies, lines, light. Draws only when asked.
 */
import {
  BufferGeometry,
  Color,
  DirectionalLight,
  DoubleSide,
  HemisphereLight,
  Mesh,
  MeshBasicMaterial,
  MeshLambertMaterial,
  OrthographicCamera,
  Scene,
  WebGLRenderer,
} from 'three'
import type { DrawingColours, PulseSceneModel } from '../../core/report'
import { colourParts } from '../plots/themeColours'
import { createRingMesh, fillBody, fillNozzle } from './meshes'
import { createRibbons } from './ribbons'
import { sceneStrokes } from './strokes'
import { add } from './vectors'
import { basisOf, lookedAt, type Size, type View } from './view'

export interface Stage {
  setModel(model: PulseSceneModel): void
  setColours(colours: DrawingColours): void
  /** Size of the picture in CSS pixels, and device pixels for each. */
  setSize(size: Size, pixelRatio: number): void
  draw(view: View): void
  /** Give everything back; `contextLost` when the browser has taken the context already. */
  dispose(contextLost: boolean): void
}

/**
 * @param antialias multisampling, off where the processor draws: there the caller draws more pixels instead.
 * @throws {Error} when the machine gives no WebGL 2 context.
 */
export function createStage(canvas: HTMLCanvasElement, antialias: boolean): Stage {
  const renderer = new WebGLRenderer({ canvas, antialias, alpha: false, powerPreference: 'low-power' })
  const scene = new Scene()
  const camera = new OrthographicCamera()
  scene.add(camera)
  scene.background = new Color()

  const sky = new HemisphereLight(0xffffff, 0x9aa0a8, 1.7)
  const key = new DirectionalLight(0xffffff, 2.0)
  // The key light stays at the eye's upper left, so that form reads alike from everywhere.
  key.position.set(-0.45, 0.8, 0.75)
  camera.add(key, key.target)
  key.target.position.set(0, 0, 0)
  scene.add(sky)

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
    scene.add(mesh)
  }

  let shown: PulseSceneModel | null = null
  let colours: DrawingColours | null = null
  let size: Size = { width: 1, height: 1 }

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
      // Matt colour under this light comes out darker than the flat accent on paper, and brighter on a dark sheet.
      ringMaterial.color.multiplyScalar(isDark(next) ? 0.85 : 1.65)
      paint(waterMaterial.color, next.accent)
      paint(nozzleMaterial.color, next.nozzle)
      if (scene.background instanceof Color) paint(scene.background, next.ground)
    },
    setSize(next, pixelRatio) {
      size = next
      renderer.setPixelRatio(pixelRatio)
      renderer.setSize(next.width, next.height, false)
    },
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
      aim(camera, shown, view, size)
      renderer.render(scene, camera)
    },
    dispose(contextLost) {
      for (const mesh of [ringMesh, nozzleMesh, slugMesh, jetMesh, lineMesh, overMesh]) mesh.geometry.dispose()
      for (const material of [ringMaterial, nozzleMaterial, waterMaterial, lineMaterial, overMaterial])
        material.dispose()
      renderer.dispose()
      if (!contextLost) renderer.forceContextLoss()
    },
  }
}

/** Whether the ground is darker than what is drawn on it. */
function isDark(colours: DrawingColours): boolean {
  const sum = (colour: string): number => colourParts(colour).reduce((total, part) => total + part, 0)
  return sum(colours.ground) < sum(colours.ink)
}

function paint(target: Color, colour: string): void {
  const [red, green, blue] = colourParts(colour)
  target.setRGB(red, green, blue, 'srgb')
}

function aim(camera: OrthographicCamera, model: PulseSceneModel, view: View, size: Size): void {
  const basis = basisOf(view)
  const { xMin, xMax, rMax } = model.extent
  // Far enough outside that nothing is cut, whatever the turn.
  const reach = 4 * (Math.max(Math.abs(xMin), Math.abs(xMax)) + rMax) + Math.hypot(view.centre.right, view.centre.up)
  const target = lookedAt(view, basis)
  const eye = add(target, basis.toward, reach)
  camera.position.set(eye[0], eye[1], eye[2])
  camera.up.set(basis.up[0], basis.up[1], basis.up[2])
  camera.lookAt(target[0], target[1], target[2])
  const [halfWidth, halfHeight] = [size.width / 2 / view.scale, size.height / 2 / view.scale]
  camera.left = -halfWidth
  camera.right = halfWidth
  camera.top = halfHeight
  camera.bottom = -halfHeight
  camera.near = 0
  camera.far = 2 * reach
  camera.updateProjectionMatrix()
}
