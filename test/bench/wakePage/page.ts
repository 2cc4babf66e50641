/** A page that plays 20 rings of 256 nodes as fast as frames come, and counts them. */
import { createApp, h, nextTick, shallowReactive } from 'vue'
import { wakeScene } from '../../../core/report'
import '../../../renderer/style/tokens.css'
import WakeScene from '../../../renderer/scene/wake/WakeScene.vue'
import { planOf } from '../../support/plans'
import { manyRings, manyRingsWake, PLAYED_FRAMES } from '../../support/wakes'

const rings = manyRings()
const model = wakeScene({ rings, wake: manyRingsWake(rings) }, planOf(), { length: 'mm', speed: 'mm/s' })
const state = shallowReactive({
  model,
  index: 0,
  selected: 3,
  follow: false,
  shown: { trails: true, stations: true, dye: false, plane: false },
})
createApp({ render: () => h(WakeScene, state) }).mount('#app')

/** Frames drawn a second over a time [s]. */
async function play(seconds: number): Promise<number> {
  const canvas = document.querySelector('canvas')
  const context = canvas?.getContext('webgl2') ?? null
  if (context === null) throw new Error('the drawing has no WebGL 2 context')
  const start = performance.now()
  let frames = 0
  while (performance.now() - start < 1000 * seconds) {
    state.index = (state.index + 1) % PLAYED_FRAMES
    await nextTick()
    await new Promise((resolve) => requestAnimationFrame(resolve))
    frames += 1
    // A queue of frames would be counted before it is drawn: now and then the last one is waited for.
    if (frames % 10 === 0) await drawn(context)
  }
  await drawn(context)
  return (1000 * frames) / (performance.now() - start)
}

async function drawn(context: WebGL2RenderingContext): Promise<void> {
  const fence = context.fenceSync(context.SYNC_GPU_COMMANDS_COMPLETE, 0)
  if (fence === null) return
  context.flush()
  while (context.clientWaitSync(fence, 0, 0) === context.TIMEOUT_EXPIRED)
    await new Promise((resolve) => setTimeout(resolve, 1))
  context.deleteSync(fence)
}

Reflect.set(window, 'playback', { play })
