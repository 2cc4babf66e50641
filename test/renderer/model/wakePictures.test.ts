import { describe, expect, it } from 'vitest'
import { defaultPlan, setWake } from '../../../core/plan'
import { run, wakePicture, type WakePictureRequest } from '../../../core/run'
import type { FinishedWake } from '../../../renderer/model/wakeJob'
import { createWakePictures } from '../../../renderer/model/wakePictures'
import type { WorkerClient } from '../../../renderer/worker/client'

const PLAN = setWake(defaultPlan(), {
  rings: [
    { circulation: 0.01, radius: 0.02, coreRadius: 0.002, core: 'uniform', centre: [0, 0, 0], direction: [1, 0, 0] },
  ],
  duration: 0.1,
})

async function finishedWake(): Promise<FinishedWake> {
  const { data, message } = await run(PLAN, { sections: ['wake'] })
  if (data === null || data.wake === null) throw new Error(message)
  return { plan: PLAN, data, wake: data.wake, partial: null }
}

/** A client that computes in this thread and remembers what it was asked. */
function countingClient() {
  const asked: WakePictureRequest[] = []
  const client: WorkerClient = {
    run: () => expect.unreachable('a picture asks for no run'),
    picture(plan, data, request) {
      asked.push(request)
      return {
        outcome: wakePicture(plan, data, request).then((picture) => ({ kind: 'picture', picture })),
        cancel: () => undefined,
      }
    },
    map: () => {
      throw new Error('no map is asked for here')
    },
    fields: () => {
      throw new Error('no fields are read here')
    },
    dispose: () => undefined,
  }
  return { client, asked }
}

async function idle(pictures: ReturnType<typeof createWakePictures>): Promise<void> {
  do await new Promise((resolve) => setTimeout(resolve, 5))
  while (pictures.progress.value !== null)
}

const DYE = { dye: 60, plane: null } as const
const BOTH = { dye: 60, plane: 'speed' } as const
const NOTHING = { dye: 0, plane: null } as const

describe('dye and field of a wake', () => {
  it('are made when they are asked for, for every output time', async () => {
    const { client } = countingClient()
    const pictures = createWakePictures(client, expect.unreachable)
    const wake = await finishedWake()
    pictures.ask(wake, BOTH)
    await idle(pictures)
    const { dye, plane } = pictures.made.value?.picture ?? {}
    expect(dye).toHaveLength(wake.wake.wake.outputTimes.length)
    expect(plane?.values).toHaveLength(wake.wake.wake.outputTimes.length)
  })

  it('are not made again where what is there holds them, and are let go with their run', async () => {
    const { client, asked } = countingClient()
    const pictures = createWakePictures(client, expect.unreachable)
    const wake = await finishedWake()
    pictures.ask(wake, BOTH)
    await idle(pictures)
    pictures.ask(wake, DYE)
    expect(asked).toEqual([BOTH])
    pictures.ask({ ...wake }, NOTHING)
    expect(pictures.made.value).toBeNull()
  })

  it('follow the last question only', async () => {
    const { client, asked } = countingClient()
    const pictures = createWakePictures(client, expect.unreachable)
    const [first, second] = [await finishedWake(), await finishedWake()]
    pictures.ask(first, DYE)
    pictures.ask(second, DYE)
    pictures.ask(second, BOTH)
    await idle(pictures)
    expect(asked).toEqual([DYE, BOTH])
    expect(pictures.made.value?.of).toBe(second)
  })
})
