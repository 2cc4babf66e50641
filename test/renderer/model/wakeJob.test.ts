import { describe, expect, it } from 'vitest'
import { shallowRef } from 'vue'
import { defaultPlan, setField, setTitle, setWake, type Plan } from '../../../core/plan'
import { run, type RunResult } from '../../../core/run'
import { createWakeJob, QUICK_BUDGET, sameWake } from '../../../renderer/model/wakeJob'
import { heldClient } from './heldClient'

const RING = {
  circulation: 0.01,
  radius: 0.02,
  coreRadius: 0.002,
  core: 'uniform',
  centre: [0, 0, 0],
  direction: [1, 0, 0],
} as const

const PLAN = setWake(defaultPlan(), { rings: [RING], duration: 0.2 })

async function resultOf(plan: Plan, aborted = false): Promise<RunResult> {
  // Aborted after the water: the march starts and ends at once.
  let asked = 0
  const signal = {
    get aborted() {
      asked++
      return aborted && asked > 1
    },
  }
  return run(plan, { sections: ['wake'] }, { signal })
}

function started() {
  const plan = shallowRef(PLAN)
  const timers: { action: () => void; after: number }[] = []
  const { client, jobs } = heldClient('rings in motion')
  const crashes: string[] = []
  const job = createWakeJob(
    client,
    () => plan.value,
    (sentence) => crashes.push(sentence),
    (action, after) => timers.push({ action, after }),
  )
  return { plan, jobs, job, timers, crashes }
}

function need<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('missing')
  return value
}

describe('the job of a wake', () => {
  it('shows how far it is, then its results, and marks them stale when the wake changes', async () => {
    const { plan, jobs, job } = started()
    expect(job.status.value).toBe('none')
    job.run()
    expect(job.status.value).toBe('running')
    need(jobs[0]).progress(0.4)
    expect(job.progress.value?.share).toBe(0.4)
    await need(jobs[0]).end({ kind: 'result', result: await resultOf(PLAN) })
    expect(job.status.value).toBe('current')
    expect(job.progress.value).toBeNull()
    expect(job.finished.value?.partial).toBeNull()
    plan.value = setField(PLAN, 'wake.duration', 0.3)
    expect(job.status.value).toBe('stale')
    plan.value = PLAN
    expect(job.status.value).toBe('current')
  })

  it('keeps what a cancelled run had, and says that it is a part', async () => {
    const { jobs, job } = started()
    job.run()
    job.cancel()
    expect(need(jobs[0]).cancelled).toBe(true)
    const result = await resultOf(PLAN, true)
    expect(result.status).toBe('cancelled')
    await need(jobs[0]).end({ kind: 'result', result })
    expect(job.status.value).toBe('partial')
    expect(job.finished.value?.partial).toMatch(/Cancelled/)
  })

  it('tells a failure with its field only while the inputs that failed stand', async () => {
    const { plan, jobs, job } = started()
    plan.value = setWake(PLAN, { rings: [{ ...RING, coreRadius: 0.2 }] })
    job.run()
    await need(jobs[0]).end({ kind: 'result', result: await resultOf(plan.value) })
    expect(job.status.value).toBe('failed')
    expect(job.failure.value?.field).toBe('wake.rings.0.coreRadius')
    plan.value = PLAN
    expect(job.failure.value).toBeNull()
  })

  it('gives up a run that nobody asked for when it takes longer than a moment', async () => {
    const { jobs, job, timers } = started()
    job.tryQuickly()
    expect(job.status.value).toBe('none')
    expect(need(timers[0]).after).toBe(QUICK_BUDGET)
    need(timers[0]).action()
    expect(need(jobs[0]).cancelled).toBe(true)
    await need(jobs[0]).end({ kind: 'result', result: await resultOf(PLAN) })
    expect(job.finished.value).toBeNull()
  })

  it('takes the results of a quick run, and follows with the newest plan what changed meanwhile', async () => {
    const { plan, jobs, job } = started()
    job.tryQuickly()
    plan.value = setField(PLAN, 'wake.duration', 0.3)
    job.tryQuickly()
    plan.value = setField(PLAN, 'wake.duration', 0.4)
    job.tryQuickly()
    expect(jobs).toHaveLength(1)
    await need(jobs[0]).end({ kind: 'result', result: await resultOf(PLAN) })
    expect(jobs.map((each) => each.plan.wake?.duration)).toEqual([0.2, 0.4])
    expect(job.status.value).toBe('stale')
  })

  it('starts an asked run only when the one before has let go of the worker', async () => {
    const { plan, jobs, job } = started()
    job.run()
    plan.value = setField(PLAN, 'wake.duration', 0.3)
    job.run()
    expect(jobs).toHaveLength(1)
    expect(job.status.value).toBe('running')
    await need(jobs[0]).end({ kind: 'cancelled' })
    expect(jobs.map((each) => each.plan.wake?.duration)).toEqual([0.2, 0.3])
    expect(job.failure.value).toBeNull()
  })

  it('does not run again what is there already', async () => {
    const { plan, jobs, job } = started()
    job.run()
    await need(jobs[0]).end({ kind: 'result', result: await resultOf(PLAN) })
    plan.value = setTitle(PLAN, 'another name')
    job.tryQuickly()
    expect(jobs).toHaveLength(1)
    expect(job.status.value).toBe('current')
  })

  it('says when the worker crashed, and can be run again', async () => {
    const { jobs, job, crashes } = started()
    job.run()
    await need(jobs[0]).end({ kind: 'crashed', message: 'out of memory' })
    expect(crashes).toHaveLength(1)
    expect(job.status.value).toBe('failed')
    job.run()
    expect(job.status.value).toBe('running')
  })
})

describe('sameWake', () => {
  it('does not look at what the wake does not read', () => {
    expect(sameWake(PLAN, setTitle(PLAN, 'other'))).toBe(true)
    // Explicit rings replace the train: the nozzle is not read.
    expect(sameWake(PLAN, setField(PLAN, 'nozzle.diameter', 0.05))).toBe(true)
    const train = setWake(PLAN, { rings: [] })
    expect(sameWake(train, setField(train, 'nozzle.diameter', 0.05))).toBe(false)
    expect(sameWake(train, setField(train, 'train.pulses', 3))).toBe(false)
    expect(sameWake(PLAN, setField(PLAN, 'ambient.axialFlow', 0.1))).toBe(false)
  })
})
