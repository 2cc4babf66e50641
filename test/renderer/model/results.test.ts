import { describe, expect, it } from 'vitest'
import { defaultPlan, setStrokeRatio, type Plan } from '../../../core/plan'
import type { RunResult } from '../../../core/run'
import { createResults } from '../../../renderer/model/results'
import type { JobOutcome, WorkerClient } from '../../../renderer/worker/client'

/** A client whose jobs end when the test says so. */
function heldClient() {
  const jobs: { plan: Plan; end: (outcome: JobOutcome) => void; cancelled: boolean }[] = []
  const client: WorkerClient = {
    run(plan) {
      let end: (outcome: JobOutcome) => void = () => undefined
      const outcome = new Promise<JobOutcome>((resolve) => (end = resolve))
      const job = { plan, end, cancelled: false }
      jobs.push(job)
      return { outcome, cancel: () => (job.cancelled = true) }
    },
    picture: () => expect.unreachable('results ask for no picture'),
    map: () => {
      throw new Error('no map is asked for here')
    },
    fields: () => {
      throw new Error('no fields are read here')
    },
    dispose: () => undefined,
  }
  return { client, jobs }
}

/** Data with nothing in it: the store never looks inside. */
const done: RunResult = {
  status: 'done',
  message: 'Done.',
  data: {
    water: {
      density: 1000,
      dynamicViscosity: 1e-3,
      kinematicViscosity: 1e-6,
      vapourPressure: 2000,
      absolutePressure: 101325,
      sources: [],
      notes: [],
    },
    pulse: null,
    jet: null,
    wake: null,
    thruster: null,
    tankRun: null,
    readings: null,
    sweep: null,
    spread: null,
    cautions: [],
  },
}
const settle = () => new Promise((resolve) => setTimeout(resolve, 0))
const plan = (ratio: number): Plan => setStrokeRatio(defaultPlan(), ratio)

describe('results', () => {
  it('never builds a queue: what changes during a run is one run of the newest plan', async () => {
    const { client, jobs } = heldClient()
    const results = createResults(client)
    const plans = [1, 2, 3, 4, 5].map(plan)
    for (const each of plans) results.request(each)
    expect(jobs).toHaveLength(1)
    jobs[0]?.end({ kind: 'result', result: done })
    await settle()
    expect(jobs).toHaveLength(2)
    expect(jobs[1]?.plan).toBe(plans[4])
    jobs[1]?.end({ kind: 'result', result: done })
    await settle()
    expect(jobs).toHaveLength(2)
    expect(results.status.value).toBe('current')
  })

  it('shows each finished run while a newer one is under way, so that numbers follow a drag', async () => {
    const { client, jobs } = heldClient()
    const results = createResults(client)
    const [first, second] = [plan(1), plan(2)]
    results.request(first)
    results.request(second)
    jobs[0]?.end({ kind: 'result', result: done })
    await settle()
    expect(results.finished.value?.plan).toBe(first)
    expect(results.status.value).toBe('running')
  })

  it('keeps old results, marked stale, after a failure and after a cancel', async () => {
    const { client, jobs } = heldClient()
    const results = createResults(client)
    results.request(plan(1))
    jobs[0]?.end({ kind: 'result', result: done })
    await settle()
    results.request(plan(2))
    jobs[1]?.end({ kind: 'result', result: { status: 'failed', message: 'No.', field: 'nozzle.diameter', data: null } })
    await settle()
    expect(results.finished.value).not.toBeNull()
    expect(results.status.value).toBe('failed')
    expect(results.failure.value).toEqual({ field: 'nozzle.diameter', message: 'No.' })
    results.request(plan(3))
    results.request(plan(4))
    results.cancel()
    expect(jobs[2]?.cancelled).toBe(true)
    jobs[2]?.end({ kind: 'cancelled' })
    await settle()
    expect(jobs).toHaveLength(3)
    expect(results.status.value).not.toBe('current')
    expect(results.finished.value).not.toBeNull()
  })

  it('tells a crash once, in a sentence, and computes the next plan', async () => {
    const { client, jobs } = heldClient()
    const told: string[] = []
    const results = createResults(client, (sentence) => told.push(sentence))
    results.request(plan(1))
    jobs[0]?.end({ kind: 'crashed', message: 'out of memory' })
    await settle()
    expect(told).toEqual(['The calculation stopped unexpectedly and was started afresh (out of memory).'])
    results.request(plan(2))
    jobs[1]?.end({ kind: 'result', result: done })
    await settle()
    expect(results.status.value).toBe('current')
    expect(results.failure.value).toBeNull()
  })
})
