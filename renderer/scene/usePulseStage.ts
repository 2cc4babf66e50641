/**
 * The life of the three-dimensional drawing in a component: made when it can be, drawn when something changed, given back at the end.
 */
import { nextTick, onBeforeUnmount, onMounted, ref, shallowRef, watch, type Ref, type ShallowRef } from 'vue'
import type { DrawingColours, PulseSceneModel } from '../../core/report'
import { createStage, type Stage } from './stage'
import { fitted, followed, STANDARD_VIEWS, turned, type Margins, type Size, type View } from './view'
import { drawingMeans } from './webgl'

/** Software draws four points a pixel when at rest and one while it moves. */
const FINEST = 2
const REST_DELAY = 140

export interface PulseStage {
  readonly view: ShallowRef<View>
  readonly size: ShallowRef<Size>
  /** 'flat': no WebGL here, or its context was lost. */
  readonly state: Readonly<Ref<'waiting' | 'solid' | 'flat'>>
  /** Turn: the drawing still follows the plan's size. */
  turn(azimuth: number, elevation: number): void
  /** Look closer or aside: from now on the plan no longer moves the view. */
  look(view: View): void
  fit(angles?: Pick<View, 'azimuth' | 'elevation'>): void
  /** Draw with given colours into the canvas now, hand it on, and put the colours back. */
  withColours<T>(colours: DrawingColours, use: (canvas: HTMLCanvasElement) => T): T | null
}

export function usePulseStage(
  canvas: Readonly<Ref<HTMLCanvasElement | null>>,
  frame: Readonly<Ref<HTMLElement | null>>,
  model: () => PulseSceneModel,
  colours: Readonly<ShallowRef<DrawingColours>>,
  margins: () => Margins,
): PulseStage {
  const size = shallowRef<Size>({ width: 640, height: 400 })
  const view = shallowRef<View>({ ...STANDARD_VIEWS.threeQuarter, scale: 1, centre: { right: 0, up: 0 } })
  const state = ref<'waiting' | 'solid' | 'flat'>('waiting')
  let stage: Stage | null = null
  let software = false
  let fits = true
  let wanted = 0
  let rest: ReturnType<typeof setTimeout> | null = null
  let moving = false
  let observer: ResizeObserver | null = null

  function ratio(): number {
    const own = Math.min(FINEST, window.devicePixelRatio || 1)
    return software ? (moving ? 1 : FINEST) : own
  }

  function draw(): void {
    wanted = 0
    stage?.draw(view.value)
  }

  function request(): void {
    if (wanted === 0 && stage !== null) wanted = requestAnimationFrame(draw)
  }

  /** Coarse while something moves, fine a moment later; only software needs it. */
  function moved(): void {
    if (software) {
      if (!moving) {
        moving = true
        stage?.setSize(size.value, ratio())
      }
      if (rest !== null) clearTimeout(rest)
      rest = setTimeout(() => {
        moving = false
        stage?.setSize(size.value, ratio())
        request()
      }, REST_DELAY)
    }
    request()
  }

  function make(): void {
    if (canvas.value === null) return
    const means = drawingMeans()
    software = means.software
    if (!means.available) {
      state.value = 'flat'
      return
    }
    try {
      stage = createStage(canvas.value, !software)
    } catch {
      state.value = 'flat'
      return
    }
    stage.setColours(colours.value)
    stage.setModel(model())
    stage.setSize(size.value, ratio())
    state.value = 'solid'
    request()
  }

  function fit(angles: Pick<View, 'azimuth' | 'elevation'> = view.value): void {
    fits = true
    view.value = fitted(model(), angles, size.value, margins())
    moved()
  }

  function resize(): void {
    if (frame.value === null) return
    const { clientWidth: width, clientHeight: height } = frame.value
    if (width === 0 || height === 0) return
    size.value = { width, height }
    stage?.setSize(size.value, ratio())
    if (fits) view.value = fitted(model(), view.value, size.value, margins())
    // A canvas is emptied by its new size: drawn in the same frame it does not flash.
    draw()
  }

  function lost(event: Event): void {
    event.preventDefault()
    stage?.dispose(true)
    stage = null
    state.value = 'flat'
  }

  function restored(): void {
    state.value = 'waiting'
    void nextTick(make)
  }

  onMounted(() => {
    canvas.value?.addEventListener('webglcontextlost', lost)
    canvas.value?.addEventListener('webglcontextrestored', restored)
    resize()
    make()
    if (frame.value !== null) {
      observer = new ResizeObserver(resize)
      observer.observe(frame.value)
    }
    fit()
  })
  onBeforeUnmount(() => {
    canvas.value?.removeEventListener('webglcontextlost', lost)
    canvas.value?.removeEventListener('webglcontextrestored', restored)
    observer?.disconnect()
    if (rest !== null) clearTimeout(rest)
    if (wanted !== 0) cancelAnimationFrame(wanted)
    stage?.dispose(false)
    stage = null
  })
  watch(model, (next) => {
    stage?.setModel(next)
    if (fits) view.value = followed(view.value, next, size.value, margins())
    moved()
  })
  watch(colours, (next) => {
    stage?.setColours(next)
    request()
  })

  return {
    view,
    size,
    state,
    turn(azimuth, elevation) {
      view.value = turned(view.value, azimuth, elevation)
      moved()
    },
    look(next) {
      view.value = next
      fits = false
      moved()
    },
    fit,
    withColours(given, use) {
      if (stage === null || canvas.value === null) return null
      stage.setSize(size.value, FINEST)
      stage.setColours(given)
      stage.draw(view.value)
      // Read back before the browser shows a frame: the buffer is not kept.
      const result = use(canvas.value)
      stage.setColours(colours.value)
      stage.setSize(size.value, ratio())
      stage.draw(view.value)
      return result
    },
  }
}
