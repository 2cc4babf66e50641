/**
 * The three-dimensional drawing of rings in motion: tubes that follow the run in place, and what stands around them.
 */
import {
  BufferAttribute,
  BufferGeometry,
  Color,
  DoubleSide,
  Group,
  Matrix4,
  Mesh,
  MeshBasicMaterial,
  MeshLambertMaterial,
  Points,
  PointsMaterial,
} from 'three'
import type { RingShape } from '../../../core/filament'
import type { WakeSceneModel, WakeSceneWall } from '../../../core/report'
import type { WakeJet } from '../../../core/run'
import { createDrawing, mattFactor, paint } from '../drawing'
import { fillNozzle } from '../meshes'
import { createRibbons } from '../ribbons'
import type { Stage } from '../useStage'
import { basisOf, type View } from '../view'
import { createFieldPlane } from './fieldPlane'
import { createJetSheet } from './jetSheet'
import { ringStrokes, trailsOf, trailStrokes, type Trail } from './ringStrokes'
import { surroundingStrokes } from './surroundingStrokes'
import { createTubes, sidesFor } from './tubes'
import { wakeColours, type WakeColours } from './wakeColours'

/** What of the drawing is shown. */
export interface WakeShown {
  readonly trails: boolean
  readonly stations: boolean
  readonly dye: boolean
  readonly plane: boolean
}

export interface WakeDrawing extends Stage {
  setModel(model: WakeSceneModel): void
  /** Jets whose sheets are drawn until they let go of their rings; null: none. After the model, before the frame. */
  setJet(jet: WakeJet | null): void
  /** Number of the output time, from 0, and the rings as they stand then. */
  setFrame(index: number, shapes: readonly RingShape[]): void
  setShown(shown: WakeShown): void
  select(ring: number | null): void
  /** Cheap: strips that face the eye instead of round tubes. `moving`: fewer corners. */
  setEffort(effort: { readonly cheap: boolean; readonly moving: boolean }): void
}

/** Vertices of tubes while they move and at rest. */
const MOVING_BUDGET = 31_000
const REST_BUDGET = 120_000
/** Thinnest tube drawn, as a radius in pixels. */
export const THINNEST = 1.2
const DYE_SIZE = 2
/** How far the sheet's colour is moved from that of rings to the ground: its edges are drawn in ink on it. */
const SHEET_PALENESS = 0.3
const SHEET_TINT = new Color()

/** @throws {Error} when the machine gives no WebGL 2 context. */
export function createWakeStage(canvas: HTMLCanvasElement, antialias: boolean): WakeDrawing {
  const drawing = createDrawing(canvas, antialias)
  const ringMaterial = new MeshLambertMaterial({ vertexColors: true })
  const nozzleMaterial = new MeshLambertMaterial({ side: DoubleSide })
  const wallMaterial = new MeshBasicMaterial({ transparent: true, opacity: 0.16, side: DoubleSide, depthWrite: false })
  const lineMaterial = new MeshBasicMaterial({ vertexColors: true, side: DoubleSide })
  // Ways of rings lie on the axes they set out on, and are read before them.
  const movingMaterial = new MeshBasicMaterial({
    vertexColors: true,
    side: DoubleSide,
    polygonOffset: true,
    polygonOffsetFactor: -1,
    polygonOffsetUnits: -8,
  })
  const overMaterial = new MeshBasicMaterial({
    vertexColors: true,
    side: DoubleSide,
    depthTest: false,
    transparent: true,
  })
  const dyeMaterial = new PointsMaterial({ size: DYE_SIZE, sizeAttenuation: false })
  const sheetMaterial = new MeshLambertMaterial({ side: DoubleSide })
  const looseMaterial = new PointsMaterial({ size: DYE_SIZE, sizeAttenuation: false })
  const tubes = createTubes()
  const sheet = createJetSheet()
  const [still, moving, over] = [createRibbons(), createRibbons(), createRibbons()]
  const plane = createFieldPlane()
  const nozzleGeometry = new BufferGeometry()
  const wallMesh = new Mesh(new BufferGeometry(), wallMaterial)
  const dye = new Points(new BufferGeometry(), dyeMaterial)
  const overMesh = new Mesh(over.geometry, overMaterial)
  const sheetMesh = new Mesh(sheet.surface, sheetMaterial)
  const loose = new Points(sheet.loose, looseMaterial)
  const nozzles = new Group()
  wallMesh.renderOrder = 1
  plane.mesh.renderOrder = 2
  overMesh.renderOrder = 3
  const meshes = [
    new Mesh(tubes.geometry, ringMaterial),
    new Mesh(still.geometry, lineMaterial),
    new Mesh(moving.geometry, movingMaterial),
    wallMesh,
    dye,
    sheetMesh,
    loose,
    plane.mesh,
    overMesh,
  ]
  for (const mesh of meshes) {
    mesh.frustumCulled = false
    drawing.scene.add(mesh)
    drawing.own(mesh.geometry)
  }
  drawing.scene.add(nozzles)
  drawing.own(
    ringMaterial,
    nozzleMaterial,
    wallMaterial,
    lineMaterial,
    overMaterial,
    dyeMaterial,
    sheetMaterial,
    looseMaterial,
    plane,
    nozzleGeometry,
  )

  let model: WakeSceneModel | null = null
  let colours: WakeColours | null = null
  let shown: WakeShown = { trails: true, stations: true, dye: false, plane: false }
  let effort = { cheap: false, moving: false }
  let index = 0
  let selected: number | null = null
  let shapes: readonly RingShape[] = []
  let trails: readonly Trail[] = []
  let reach = 1
  let stillFor: View | null = null
  const paints: { accent: readonly [number, number, number]; counter: readonly [number, number, number] } = {
    accent: [0, 0, 0],
    counter: [0, 0, 0],
  }

  function follow(): void {
    if (model === null) return
    sheetMesh.visible = sheet.show(timeAt(model, index))
    loose.visible = sheetMesh.visible
    if (dye.visible) showDye(dye, model, index)
    if (plane.mesh.visible) plane.show(index)
  }

  function show(): void {
    dye.visible = shown.dye && model !== null && model.dye !== null
    plane.mesh.visible = shown.plane && model !== null && model.plane !== null
    if (model !== null && model.plane !== null) plane.set(model.plane)
    stillFor = null
    follow()
  }

  return {
    setModel(next) {
      model = next
      trails = trailsOf(next)
      reach = 2 * farthest(next)
      const first = next.nozzles[0]
      if (first !== undefined) fillNozzle(nozzleGeometry, first.outline)
      nozzles.clear()
      for (const nozzle of next.nozzles) {
        const mesh = new Mesh(nozzleGeometry, nozzleMaterial)
        mesh.frustumCulled = false
        mesh.matrixAutoUpdate = false
        mesh.matrix.copy(nozzleMatrix(nozzle))
        nozzles.add(mesh)
      }
      wallMesh.visible = next.wall !== null
      if (next.wall !== null) fillWall(wallMesh.geometry, next.wall)
      show()
    },
    setJet(jet) {
      sheet.setJet(jet)
      follow()
    },
    setFrame(next, rings) {
      index = next
      shapes = rings
      follow()
    },
    setShown(next) {
      shown = next
      show()
    },
    select(ring) {
      selected = ring
    },
    setEffort(next) {
      effort = next
    },
    setColours(next) {
      colours = wakeColours(next)
      for (const name of ['accent', 'counter'] as const) {
        const colour = new Color()
        paint(colour, colours[name])
        colour.multiplyScalar(mattFactor(next))
        paints[name] = [colour.r, colour.g, colour.b]
      }
      paint(nozzleMaterial.color, next.nozzle)
      paint(wallMaterial.color, next.edge)
      paint(dyeMaterial.color, next.muted)
      paint(looseMaterial.color, next.ink)
      paint(sheetMaterial.color, next.accent)
      sheetMaterial.color.lerp(SHEET_TINT.set(next.ground), SHEET_PALENESS).multiplyScalar(mattFactor(next))
      drawing.setGround(next.ground)
      stillFor = null
    },
    setSize: drawing.setSize,
    draw(view) {
      if (model === null || colours === null) return
      const basis = basisOf(view)
      const perPixel = 1 / view.scale
      const nodes = shapes.reduce((sum, shape) => sum + shape.nodes.length / 3, 0)
      const rings = shapes.map(({ nodes: curve, radius, coreRadius, number }) => ({
        nodes: curve,
        // A core thicker than its ring has no tube: it is drawn up to the axis.
        coreRadius: Math.min(coreRadius, radius),
        paint: (model?.rings[number - 1]?.sense ?? 1) > 0 ? paints.accent : paints.counter,
      }))
      tubes.draw(rings, {
        sides: effort.cheap ? 0 : sidesFor(nodes, effort.moving ? MOVING_BUDGET : REST_BUDGET),
        least: THINNEST * perPixel,
        toward: basis.toward,
      })
      if (!sameLines(stillFor, view)) {
        stillFor = view
        still.draw(surroundingStrokes(model, shown.stations, basis, perPixel), basis, perPixel, colours)
      }
      const strokes = [
        ...(shown.trails ? trailStrokes(trails, shapes, timeAt(model, index)) : []),
        ...ringStrokes(model, shapes, selected, basis, perPixel),
        ...sheet.strokes(),
      ]
      moving.draw(
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
      drawing.render(view, reach)
    },
    whenDrawn: drawing.whenDrawn,
    dispose: drawing.dispose,
  }
}

function timeAt(model: WakeSceneModel, index: number): number {
  return model.wake.outputTimes[index] ?? model.wake.time
}

/** Lines that face the eye stay as they are while the picture only slides. */
function sameLines(before: View | null, now: View): boolean {
  return (
    before !== null &&
    before.azimuth === now.azimuth &&
    before.elevation === now.elevation &&
    before.scale === now.scale
  )
}

function farthest({ reach }: WakeSceneModel): number {
  let most = 0
  for (let i = 0; i < reach.length; i += 3)
    most = Math.max(most, Math.hypot(reach[i] ?? 0, reach[i + 1] ?? 0, reach[i + 2] ?? 0))
  return most
}

function nozzleMatrix({ position, axes, stretch }: WakeSceneModel['nozzles'][number]): Matrix4 {
  const [x, y, z] = axes
  const [a, b] = stretch
  return new Matrix4().set(
    x[0],
    y[0] * a,
    z[0] * b,
    position[0],
    x[1],
    y[1] * a,
    z[1] * b,
    position[1],
    x[2],
    y[2] * a,
    z[2] * b,
    position[2],
    0,
    0,
    0,
    1,
  )
}

function fillWall(geometry: BufferGeometry, { corners }: WakeSceneWall): void {
  geometry.dispose()
  geometry.setAttribute('position', new BufferAttribute(Float32Array.from(corners.flat()), 3))
  geometry.setIndex([0, 1, 2, 0, 2, 3])
}

/** Points of an output time, copied into the buffer that is there. */
function showDye(points: Points, { dye }: WakeSceneModel, index: number): void {
  const places = dye?.positions[index]
  if (places === undefined) return
  const held = points.geometry.getAttribute('position')
  if (held instanceof BufferAttribute && held.array instanceof Float32Array && held.array.length >= places.length) {
    held.array.set(places)
    held.needsUpdate = true
  } else {
    points.geometry.dispose()
    points.geometry.setAttribute('position', new BufferAttribute(places.slice(), 3))
  }
  points.geometry.setDrawRange(0, places.length / 3)
}
