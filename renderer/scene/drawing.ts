/**
 * What every three-dimensional drawing stands on: its canvas, its light, its parallel camera. Draws only when asked.
 */
import { Color, DirectionalLight, HemisphereLight, OrthographicCamera, Scene, WebGLRenderer } from 'three'
import type { DrawingColours } from '../../core/report'
import { colourParts } from '../plots/themeColours'
import { add } from './vectors'
import { basisOf, lookedAt, type Size, type View } from './view'

/** What holds memory that the collector does not know of. */
interface Disposable {
  dispose(): void
}

/** How often a fence is asked whether it is passed [ms], and how many times. */
const ASKED_EVERY = 2
const MOST_ASKED = 500

export interface Drawing {
  readonly scene: Scene
  /** Give these back with the drawing. */
  own(...parts: readonly Disposable[]): void
  setGround(colour: string): void
  /** Size of the picture in CSS pixels, and device pixels for each. */
  setSize(size: Size, pixelRatio: number): void
  /** @param reach distance from the origin inside which everything lies [m] */
  render(view: View, reach: number): void
  /** Tell when what was asked for is drawn; not at all where that cannot be known. */
  whenDrawn(tell: () => void): void
  /** Give everything back; `contextLost` when the browser has taken the context already. */
  dispose(contextLost: boolean): void
}

/**
 * @param antialias multisampling, off where the processor draws: there the caller draws more pixels instead.
 * @throws {Error} when the machine gives no WebGL 2 context.
 */
export function createDrawing(canvas: HTMLCanvasElement, antialias: boolean): Drawing {
  const renderer = new WebGLRenderer({ canvas, antialias, alpha: false, powerPreference: 'low-power' })
  const scene = new Scene()
  const camera = new OrthographicCamera()
  scene.add(camera)
  const ground = new Color()
  scene.background = ground

  const sky = new HemisphereLight(0xffffff, 0x9aa0a8, 1.7)
  const key = new DirectionalLight(0xffffff, 2.0)
  // The key light stays at the eye's upper left, so that form reads alike from everywhere.
  key.position.set(-0.45, 0.8, 0.75)
  camera.add(key, key.target)
  key.target.position.set(0, 0, 0)
  scene.add(sky)

  const owned: Disposable[] = []
  let disposed = false
  let size: Size = { width: 1, height: 1 }
  return {
    scene,
    own: (...parts) => void owned.push(...parts),
    setGround: (colour) => paint(ground, colour),
    setSize(next, pixelRatio) {
      size = next
      renderer.setPixelRatio(pixelRatio)
      renderer.setSize(next.width, next.height, false)
    },
    render(view, reach) {
      aim(camera, view, size, reach)
      renderer.render(scene, camera)
    },
    whenDrawn(tell) {
      const context = renderer.getContext()
      if (!(context instanceof WebGL2RenderingContext)) return
      // A fence, asked now and then: reading a pixel back would hold the page up instead.
      const fence = context.fenceSync(context.SYNC_GPU_COMMANDS_COMPLETE, 0)
      if (fence === null) return
      context.flush()
      const ask = (tries: number): void => {
        if (disposed) return
        const status = context.clientWaitSync(fence, 0, 0)
        const done = status === context.ALREADY_SIGNALED || status === context.CONDITION_SATISFIED
        if (!done && status !== context.WAIT_FAILED && tries < MOST_ASKED) {
          setTimeout(() => ask(tries + 1), ASKED_EVERY)
          return
        }
        context.deleteSync(fence)
        if (done) tell()
      }
      setTimeout(() => ask(0), ASKED_EVERY)
    },
    dispose(contextLost) {
      disposed = true
      for (const part of owned) part.dispose()
      renderer.dispose()
      if (!contextLost) renderer.forceContextLoss()
    },
  }
}

/** Whether the ground is darker than what is drawn on it. */
export function isDark(colours: Pick<DrawingColours, 'ground' | 'ink'>): boolean {
  const sum = (colour: string): number => colourParts(colour).reduce((total, part) => total + part, 0)
  return sum(colours.ground) < sum(colours.ink)
}

export function paint(target: Color, colour: string): void {
  const [red, green, blue] = colourParts(colour)
  target.setRGB(red, green, blue, 'srgb')
}

/** Matt colour under the light comes out darker than the flat accent on paper, and brighter on a dark ground. */
export function mattFactor(colours: Pick<DrawingColours, 'ground' | 'ink'>): number {
  return isDark(colours) ? 0.85 : 1.65
}

function aim(camera: OrthographicCamera, view: View, size: Size, around: number): void {
  const basis = basisOf(view)
  // Far enough outside that nothing is cut, whatever the turn.
  const reach = around + Math.hypot(view.centre.right, view.centre.up)
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
