/**
 * The drawing of a starting jet, as a section or in space: the sheet follows the playback in buffers that stay.
 */
import { BufferAttribute, BufferGeometry, DoubleSide, Mesh, MeshBasicMaterial, MeshLambertMaterial } from 'three'
import { emptyLine, layLine, type JetSceneModel } from '../../../core/report'
import { createDrawing, isDark, mattFactor, paint } from '../drawing'
import { fillNozzle } from '../meshes'
import { createRibbons } from '../ribbons'
import type { Stage } from '../useStage'
import { basisOf, type View } from '../view'
import { jetColours, shapeStrokes, stillStrokes, wallCorners } from './jetStrokes'
import { createSheetSurface } from './sheetSurface'

export interface JetDrawing extends Stage {
  setModel(model: JetSceneModel): void
  /** Number of the shape. */
  setFrame(index: number): void
  /** True: a flat section; false: the surface in space. */
  setFlat(flat: boolean): void
}

/** Points of the sheet are drawn so far apart [pixels]. */
const FINEST = 2.5
/** What the surface lets through. */
const SHEET_OPACITY = 0.8
const REGION_OPACITY = 0.08

/** @throws {Error} when the machine gives no WebGL 2 context. */
export function createJetStage(canvas: HTMLCanvasElement, antialias: boolean): JetDrawing {
  const drawing = createDrawing(canvas, antialias)
  const sheetMaterial = new MeshLambertMaterial({
    vertexColors: true,
    side: DoubleSide,
    transparent: true,
    opacity: SHEET_OPACITY,
  })
  const nozzleMaterial = new MeshLambertMaterial({ side: DoubleSide })
  const wallMaterial = new MeshBasicMaterial({ side: DoubleSide })
  const regionMaterial = new MeshBasicMaterial({
    transparent: true,
    opacity: REGION_OPACITY,
    side: DoubleSide,
    depthWrite: false,
  })
  const lineMaterial = new MeshBasicMaterial({ vertexColors: true, side: DoubleSide })
  const sheet = createSheetSurface()
  const [still, moving] = [createRibbons(), createRibbons()]
  const sheetMesh = new Mesh(sheet.geometry, sheetMaterial)
  const nozzleMesh = new Mesh(new BufferGeometry(), nozzleMaterial)
  const wallMesh = new Mesh(new BufferGeometry(), wallMaterial)
  const regionMesh = new Mesh(new BufferGeometry(), regionMaterial)
  const meshes = [
    sheetMesh,
    nozzleMesh,
    wallMesh,
    regionMesh,
    new Mesh(still.geometry, lineMaterial),
    new Mesh(moving.geometry, lineMaterial),
  ]
  for (const mesh of meshes) {
    mesh.frustumCulled = false
    drawing.scene.add(mesh)
    drawing.own(mesh.geometry)
  }
  drawing.own(sheetMaterial, nozzleMaterial, wallMaterial, regionMaterial, lineMaterial)
  const corners = new Float32Array(12)
  regionMesh.geometry.setAttribute('position', new BufferAttribute(corners, 3))
  regionMesh.geometry.setIndex([0, 1, 2, 0, 2, 3])

  let model: JetSceneModel | null = null
  let index = 0
  let flat = true
  let colours: ReturnType<typeof jetColours> | null = null
  const [fine, coarse] = [emptyLine(), emptyLine()]

  function show(): void {
    sheetMesh.visible = !flat
    nozzleMesh.visible = !flat
    wallMesh.visible = flat
    follow()
  }

  /** What changes with the shape but not with the view. */
  function follow(): void {
    const shape = model?.shapes[index]
    if (model === null || shape === undefined) return
    if (!flat) {
      layLine(coarse, shape, Infinity)
      sheet.draw(coarse)
    }
    const { cutX } = shape
    regionMesh.visible = flat && cutX !== null
    if (cutX === null) return
    const { xMax, rMax } = model.extent
    corners.set([cutX, -rMax, 0, xMax, -rMax, 0, xMax, rMax, 0, cutX, rMax, 0])
    const places = regionMesh.geometry.getAttribute('position')
    if (places instanceof BufferAttribute) places.needsUpdate = true
  }

  return {
    setModel(next) {
      model = next
      fillNozzle(nozzleMesh.geometry, next.nozzle)
      fillWall(wallMesh.geometry, next)
      show()
    },
    setFrame(next) {
      index = next
      follow()
    },
    setFlat(next) {
      flat = next
      show()
    },
    setColours(next) {
      const dark = isDark(next)
      colours = jetColours(next, dark)
      sheet.setColours(dark, mattFactor(next))
      paint(nozzleMaterial.color, next.nozzle)
      paint(wallMaterial.color, next.nozzle)
      paint(regionMaterial.color, next.accent)
      drawing.setGround(next.ground)
      follow()
    },
    setSize: drawing.setSize,
    draw(view: View) {
      const shape = model?.shapes[index]
      if (model === null || colours === null || shape === undefined) return
      const basis = basisOf(view)
      const perPixel = 1 / view.scale
      layLine(fine, shape, FINEST * perPixel)
      still.draw(stillStrokes(model, flat), basis, perPixel, colours)
      moving.draw(shapeStrokes(model, index, fine, flat, perPixel), basis, perPixel, colours)
      const { xMin, xMax, rMax } = model.extent
      drawing.render(view, 4 * (Math.max(Math.abs(xMin), Math.abs(xMax)) + rMax))
    },
    whenDrawn: drawing.whenDrawn,
    dispose: drawing.dispose,
  }
}

/** Both halves of the cut wall, flat. */
function fillWall(geometry: BufferGeometry, model: JetSceneModel): void {
  const wall = wallCorners(model)
  const places = [1, -1].flatMap((side) => wall.flatMap(([x, r]) => [x, side * r, 0]))
  geometry.dispose()
  geometry.setAttribute('position', new BufferAttribute(Float32Array.from(places), 3))
  geometry.setIndex([0, 1, 2, 0, 2, 3, 4, 5, 6, 4, 6, 7])
}
