/**
 * The life of a three-dimensional drawing in a component: made when it can be, drawn when something changed, given back at the end.
 */
import { nextTick, onBeforeUnmount, onMounted, ref, shallowRef, watch, type Ref, type ShallowRef } from 'vue'
import type { DrawingColours } from '../../core/report'
import { createPace } from './pace'
import { STANDARD_VIEWS, turned, type Angles, type Margins, type Size, type View } from './view'
import { drawingMeans } from './webgl'

/** A drawing on its canvas, as its life sees it. */
export interface Stage {
  setColours(colours: DrawingColours): void
  /** Size of the picture in CSS pixels, and device pixels for each. */
  setSize(size: Size, pixelRatio: number): void
  draw(view: View): void
  /** Tell when what was asked for is drawn. */
  whenDrawn(tell: () => void): void
  /** Give everything back; `contextLost` when the browser has taken the context already. */
  dispose(contextLost: boolean): void
}

/** Software draws four points a pixel when at rest and one while it moves. */
const FINEST = 2

export interface StageOptions<S extends Stage> {
  readonly canvas: Readonly<Ref<HTMLCanvasElement | null>>
  readonly frame: Readonly<Ref<HTMLElement | null>>
  readonly colours: Readonly<ShallowRef<DrawingColours>>
  /** @throws {Error} when the machine gives no WebGL 2 context */
  readonly create: (canvas: HTMLCanvasElement, antialias: boolean) => S
  /** A drawing was made: give it what it shows. */
  readonly begin: (stage: S) => void
  /** The view at which everything fills the picture. */
  readonly fitted: (angles: Angles, size: Size, margins: Margins) => View
  readonly margins: () => Margins
  /** Told how long a drawing takes on the processor, now and then while things move [ms]. */
  readonly onCost?: (cost: number) => void
  /** The picture stands still again. */
  readonly onRest?: () => void
}

export interface StageLife<S extends Stage> {
  readonly view: ShallowRef<View>
  readonly size: ShallowRef<Size>
  /** 'flat': no WebGL here, or its context was lost. */
  readonly state: Readonly<Ref<'waiting' | 'solid' | 'flat'>>
  /** The processor draws. */
  readonly software: Readonly<Ref<boolean>>
  stage(): S | null
  /** True until the user looks closer or aside. */
  fits(): boolean
  /** Something moved: draw it, coarse first where the processor draws. */
  moved(): void
  /** Something changed that does not move. */
  request(): void
  /** Turn: the drawing still follows its model's size. */
  turn(azimuth: number, elevation: number): void
  /** Look closer or aside: from now on the model no longer moves the view. */
  look(view: View): void
  fit(angles?: Angles): void
  /** Draw with given colours into the canvas now, hand it on, and put the colours back. */
  withColours<T>(colours: DrawingColours, use: (canvas: HTMLCanvasElement) => T): T | null
}

export function useStage<S extends Stage>(options: StageOptions<S>): StageLife<S> {
  const { canvas, frame, colours } = options
  const size = shallowRef<Size>({ width: 640, height: 400 })
  const view = shallowRef<View>({ ...STANDARD_VIEWS.threeQuarter, scale: 1, centre: { right: 0, up: 0 } })
  const state = ref<'waiting' | 'solid' | 'flat'>('waiting')
  const software = ref(false)
  let stage: S | null = null
  let fits = true
  let observer: ResizeObserver | null = null
  const pace = createPace({
    draw: () => stage?.draw(view.value),
    whenDrawn: (tell) => stage?.whenDrawn(tell),
    setFine: () => stage?.setSize(size.value, ratio()),
    onCost: (cost) => options.onCost?.(cost),
    onRest: () => options.onRest?.(),
  })

  function ratio(): number {
    const own = Math.min(FINEST, window.devicePixelRatio || 1)
    return software.value ? (pace.coarse() ? 1 : FINEST) : own
  }

  function make(): void {
    if (canvas.value === null) return
    const means = drawingMeans()
    software.value = means.software
    pace.setSoftware(means.software)
    if (!means.available) {
      state.value = 'flat'
      return
    }
    try {
      stage = options.create(canvas.value, !means.software)
    } catch {
      state.value = 'flat'
      return
    }
    stage.setColours(colours.value)
    options.begin(stage)
    stage.setSize(size.value, ratio())
    state.value = 'solid'
    pace.request()
  }

  function fit(angles: Angles = view.value): void {
    fits = true
    view.value = options.fitted(angles, size.value, options.margins())
    pace.moved()
  }

  function resize(): void {
    if (frame.value === null) return
    const { clientWidth: width, clientHeight: height } = frame.value
    if (width === 0 || height === 0) return
    size.value = { width, height }
    stage?.setSize(size.value, ratio())
    if (fits) view.value = options.fitted(view.value, size.value, options.margins())
    // A canvas is emptied by its new size: drawn in the same frame it does not flash.
    pace.drawNow()
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
    pace.stop()
    stage?.dispose(false)
    stage = null
  })
  watch(colours, (next) => {
    stage?.setColours(next)
    pace.request()
  })

  return {
    view,
    size,
    state,
    software,
    stage: () => stage,
    fits: () => fits,
    moved: pace.moved,
    request: pace.request,
    turn(azimuth, elevation) {
      view.value = turned(view.value, azimuth, elevation)
      pace.moved()
    },
    look(next) {
      view.value = next
      fits = false
      pace.moved()
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
