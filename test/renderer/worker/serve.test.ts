import { MessageChannel } from 'node:worker_threads'
import { afterEach, describe, expect, it } from 'vitest'
import { defaultPlan, setField, setJet, setStrokeRatio, setWake, type Plan } from '../../../core/plan'
import { run } from '../../../core/run'
import { createWorkerClient, type WorkerHandle } from '../../../renderer/worker/client'
import { decodeAnswer, decodeRequest } from '../../../renderer/worker/decodeMessages'
import type { WorkerAnswer } from '../../../renderer/worker/messages'
import { serve } from '../../../renderer/worker/serve'

const opened: { close(): void }[] = []
afterEach(() => {
  for (const port of opened.splice(0)) port.close()
})

/** A worker over a message channel: the same serve() as the real one, with structured clones in between. */
function channelWorker(onHandOver: (buffers: readonly ArrayBuffer[]) => void = () => undefined): WorkerHandle {
  const { port1, port2 } = new MessageChannel()
  opened.push(port1)
  serve({
    post: (message, handedOver = []) => {
      port2.postMessage(message, [...handedOver])
      onHandOver(handedOver)
    },
    listen: (listener) =>
      port2.on('message', (data: unknown) => {
        const request = decodeRequest(data)
        if (request !== null) listener(request)
      }),
  })
  return {
    post: (message) => port1.postMessage(message),
    listen: (listener) =>
      port1.on('message', (data: unknown) => {
        const answer = decodeAnswer(data)
        if (answer !== null) listener(answer)
      }),
    onCrash: () => undefined,
    terminate: () => port1.close(),
  }
}

describe('worker behind a port', () => {
  it('answers with the very numbers of core/run', async () => {
    const client = createWorkerClient(() => channelWorker())
    const plan = defaultPlan()
    const outcome = await client.run(plan, ['water', 'pulse']).outcome
    const direct = await run(plan, { sections: ['water', 'pulse'] })
    expect(outcome).toEqual({ kind: 'result', result: direct })
    client.dispose()
  })

  it('reports progress on the way', async () => {
    const client = createWorkerClient(() => channelWorker())
    const steps: number[] = []
    await client.run(defaultPlan(), ['water', 'pulse'], (progress) => steps.push(progress.share)).outcome
    expect(steps.length).toBeGreaterThan(0)
    expect(steps).toEqual([...steps].sort((a, b) => a - b))
    client.dispose()
  })

  it('hands a failure of the core over as a sentence, not as an exception', async () => {
    const client = createWorkerClient(() => channelWorker())
    const broken = setField(defaultPlan(), 'programme.peakSpeed', -1)
    const outcome = await client.run(broken, ['water', 'pulse']).outcome
    expect(outcome.kind).toBe('result')
    if (outcome.kind !== 'result') return
    expect(outcome.result.status).toBe('failed')
    expect(outcome.result.message).toMatch(/peakSpeed/u)
    expect(outcome.result.field).toBe('programme.peakSpeed')
    client.dispose()
  })

  it('keeps a finished jet for the runs at every change, which compute none', async () => {
    const client = createWorkerClient(() => channelWorker())
    const coarse = setJet(setStrokeRatio(defaultPlan(), 6.5), { ensemble: false, delta: 0.2 })
    const computedAt = async (plan: Plan, jet: 'run' | 'cached'): Promise<number | null | undefined> => {
      const outcome = await client.run(plan, ['pulse'], undefined, jet).outcome
      return outcome.kind === 'result' ? outcome.result.data?.pulse?.formationNumber.computed : undefined
    }
    expect(await computedAt(coarse, 'cached')).toBeNull()
    const found = await computedAt(coarse, 'run')
    expect(found).toBeGreaterThan(3)
    expect(await computedAt(setField(coarse, 'water.depth', 4), 'cached')).toBe(found)
    expect(await computedAt(setStrokeRatio(coarse, 6.6), 'cached')).toBeNull()
    client.dispose()
  })

  it('passes over what is no message of ours', () => {
    expect(decodeRequest({ kind: 'run' })).toBeNull()
    expect(decodeRequest('run')).toBeNull()
    expect(decodeAnswer({ kind: 'cancel', id: 1 })).toBeNull()
  })
})

/** Rings that share no axis, for longer than a test may take. */
const LONG = setWake(defaultPlan(), {
  rings: Array.from({ length: 6 }, (_, k) => ({
    circulation: 0.01,
    radius: 0.02,
    coreRadius: 0.004,
    core: 'uniform' as const,
    centre: [0.1 * k, 0.01 * (k % 2), 0] as const,
    direction: [1, 0, 0] as const,
  })),
  duration: 500,
  outputStep: 0.05,
})

describe('a wake in the worker', () => {
  it('comes over with the very numbers of core/run, its paths handed over and not copied', async () => {
    const plan = setWake(LONG, { duration: 0.02, outputStep: 0.01 })
    const direct = await run(plan, { sections: ['wake'] })
    const handed: ArrayBuffer[][] = []
    const client = createWorkerClient(() => channelWorker((buffers) => handed.push([...buffers])))
    const outcome = await client.run(plan, ['wake']).outcome
    expect(outcome).toEqual({ kind: 'result', result: direct })
    const buffers = handed.at(-1) ?? []
    expect(buffers.length).toBeGreaterThan(10)
    // What was handed over is gone on the other side.
    expect(buffers.every(({ byteLength }) => byteLength === 0)).toBe(true)
    client.dispose()
  })

  it('can be run twice: nothing the core needs again was given away', async () => {
    const plan = setWake(LONG, { rings: [], duration: 2 })
    const client = createWorkerClient(() => channelWorker())
    const first = await client.run(plan, ['wake']).outcome
    const second = await client.run(plan, ['wake']).outcome
    expect(second).toEqual(first)
    client.dispose()
  })

  it('hears a cancellation in the middle of a march, and hands over what was finished', async () => {
    const client = createWorkerClient(() => channelWorker())
    const reports: number[] = []
    const job = client.run(LONG, ['wake'], ({ share }) => reports.push(share))
    while (reports.length < 4) await new Promise((resolve) => setTimeout(resolve, 20))
    const from = performance.now()
    job.cancel()
    const outcome = await job.outcome
    expect(performance.now() - from).toBeLessThan(200)
    expect(outcome.kind === 'result' && outcome.result.status).toBe('cancelled')
    const wake = outcome.kind === 'result' ? outcome.result.data?.wake?.wake : undefined
    expect(wake?.outputTimes.length).toBeGreaterThan(0)
    expect(wake?.time).toBeLessThan(500)
    client.dispose()
  })

  it('reports its progress no more often than anyone can read', async () => {
    const client = createWorkerClient(() => channelWorker())
    let count = 0
    const from = performance.now()
    const plan = setWake(LONG, { rings: LONG.wake?.rings.slice(0, 2) ?? [], duration: 0.5 })
    await client.run(plan, ['wake'], () => count++).outcome
    expect(count).toBeLessThanOrEqual((performance.now() - from) / 50 + 2)
    client.dispose()
  })
})

/** A worker that answers only when told to. */
function heldWorker() {
  const state = {
    started: 0,
    ended: 0,
    crash: (message: string): void => expect.unreachable(`no worker was spawned: ${message}`),
    answer: (message: WorkerAnswer): void => expect.unreachable(`no worker was spawned: ${message.kind}`),
    posted: [] as unknown[],
  }
  const spawn = (): WorkerHandle => {
    state.started++
    return {
      post: (message) => state.posted.push(message),
      listen: (listener) => (state.answer = listener),
      onCrash: (listener) => (state.crash = listener),
      terminate: () => state.ended++,
    }
  }
  return { state, spawn }
}

describe('worker client', () => {
  it('settles open jobs when the worker crashes and starts a fresh one for the next', async () => {
    const { state, spawn } = heldWorker()
    const client = createWorkerClient(spawn)
    const job = client.run(defaultPlan(), ['pulse'])
    state.crash('out of memory')
    expect(await job.outcome).toEqual({ kind: 'crashed', message: 'out of memory' })
    expect(state).toMatchObject({ started: 1, ended: 1 })
    client.run(defaultPlan(), ['pulse'])
    expect(state.started).toBe(2)
  })

  it('replaces a worker that does not answer a cancel in time', async () => {
    const { state, spawn } = heldWorker()
    const timers: (() => void)[] = []
    const client = createWorkerClient(spawn, (action) => timers.push(action))
    const job = client.run(defaultPlan(), ['pulse'])
    job.cancel()
    expect(state.posted.at(-1)).toEqual({ kind: 'cancel', id: 1 })
    timers.forEach((timer) => timer())
    expect(await job.outcome).toEqual({ kind: 'cancelled' })
    expect(state.ended).toBe(1)
  })

  it('keeps the worker when the cancelled job answers in time', async () => {
    const { state, spawn } = heldWorker()
    const timers: (() => void)[] = []
    const client = createWorkerClient(spawn, (action) => timers.push(action))
    const job = client.run(defaultPlan(), ['pulse'])
    job.cancel()
    const result = { status: 'cancelled', message: 'Cancelled.', data: null } as const
    state.answer({ kind: 'result', id: 1, result })
    timers.forEach((timer) => timer())
    expect(await job.outcome).toEqual({ kind: 'result', result })
    expect(state.ended).toBe(0)
  })
})
