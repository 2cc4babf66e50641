import { MessageChannel } from 'node:worker_threads'
import { afterEach, describe, expect, it } from 'vitest'
import { defaultPlan, setField } from '../../../core/plan'
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
function channelWorker(): WorkerHandle {
  const { port1, port2 } = new MessageChannel()
  opened.push(port1)
  serve({
    post: (message) => port2.postMessage(message),
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
    const client = createWorkerClient(channelWorker)
    const plan = defaultPlan()
    const outcome = await client.run(plan, ['water', 'pulse']).outcome
    const direct = await run(plan, { sections: ['water', 'pulse'] })
    expect(outcome).toEqual({ kind: 'result', result: direct })
    client.dispose()
  })

  it('reports progress on the way', async () => {
    const client = createWorkerClient(channelWorker)
    const steps: number[] = []
    await client.run(defaultPlan(), ['water', 'pulse'], (progress) => steps.push(progress.share)).outcome
    expect(steps.length).toBeGreaterThan(0)
    expect(steps).toEqual([...steps].sort((a, b) => a - b))
    client.dispose()
  })

  it('hands a failure of the core over as a sentence, not as an exception', async () => {
    const client = createWorkerClient(channelWorker)
    const broken = setField(defaultPlan(), 'programme.peakSpeed', -1)
    const outcome = await client.run(broken, ['water', 'pulse']).outcome
    expect(outcome.kind).toBe('result')
    if (outcome.kind !== 'result') return
    expect(outcome.result.status).toBe('failed')
    expect(outcome.result.message).toMatch(/peakSpeed/u)
    expect(outcome.result.field).toBe('programme.peakSpeed')
    client.dispose()
  })

  it('passes over what is no message of ours', () => {
    expect(decodeRequest({ kind: 'run' })).toBeNull()
    expect(decodeRequest('run')).toBeNull()
    expect(decodeAnswer({ kind: 'cancel', id: 1 })).toBeNull()
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
