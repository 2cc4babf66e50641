import { beforeAll, describe, expect, it } from 'vitest'
import { shallowRef } from 'vue'
import { defaultPlan, setField, setJet, setTitle } from '../../../core/plan'
import { run, type RunResult } from '../../../core/run'
import { createJetJob, sameJet } from '../../../renderer/model/jetJob'
import { heldClient } from './heldClient'

/** One coarse smoothing length and a short stroke: a tenth of a second. */
const PLAN = setField(setJet(defaultPlan(), { ensemble: false, delta: 0.2 }), 'programme.stroke', 0.03)

let whole: RunResult
let part: RunResult

beforeAll(async () => {
  whole = await run(PLAN, { sections: ['pulse', 'jet'] })
  let asked = 0
  const signal = {
    get aborted() {
      asked += 1
      return asked > 60
    },
  }
  part = await run(PLAN, { sections: ['pulse', 'jet'] }, { signal })
})

function started() {
  const plan = shallowRef(PLAN)
  const { client, jobs } = heldClient('starting jet')
  const crashes: string[] = []
  let done = 0
  const job = createJetJob({
    client,
    open: () => plan.value,
    onCrash: (sentence) => crashes.push(sentence),
    onDone: () => (done += 1),
  })
  return { plan, jobs, job, crashes, done: () => done }
}

function need<T>(value: T | undefined): T {
  if (value === undefined) throw new Error('missing')
  return value
}

describe('the job of a starting jet', () => {
  it('asks for jet and pulse, shows how far it is, then its results, and tells that it is done', async () => {
    const { jobs, job, done } = started()
    expect(job.status.value).toBe('none')
    job.run()
    expect(need(jobs[0]).sections).toEqual(['water', 'pulse', 'jet'])
    expect(job.status.value).toBe('running')
    need(jobs[0]).progress(0.4)
    expect(job.progress.value?.share).toBe(0.4)
    await need(jobs[0]).end({ kind: 'result', result: whole })
    expect(job.status.value).toBe('current')
    expect(job.progress.value).toBeNull()
    expect(job.finished.value?.partial).toBeNull()
    expect(job.finished.value?.pulse).not.toBeNull()
    expect(done()).toBe(1)
  })

  it('marks its results stale when what the jet reads changes, and finds them again after a step back', async () => {
    const { plan, jobs, job } = started()
    job.run()
    await need(jobs[0]).end({ kind: 'result', result: whole })
    plan.value = setField(PLAN, 'nozzle.diameter', 0.05)
    expect(job.status.value).toBe('stale')
    expect(job.finished.value?.plan).toBe(PLAN)
    const other = plan.value
    job.run()
    await need(jobs[1]).end({ kind: 'result', result: whole })
    expect(job.finished.value?.plan).toBe(other)
    plan.value = PLAN
    expect(job.status.value).toBe('current')
    expect(job.finished.value?.plan).toBe(PLAN)
  })

  it('keeps what a cancelled run had, says that it is a part, and replaces it by the next', async () => {
    expect(part.status).toBe('cancelled')
    const { jobs, job, done } = started()
    job.run()
    job.cancel()
    expect(need(jobs[0]).cancelled).toBe(true)
    await need(jobs[0]).end({ kind: 'result', result: part })
    expect(job.status.value).toBe('partial')
    expect(job.finished.value?.partial).toMatch(/Cancelled/)
    expect(done()).toBe(0)
    job.run()
    await need(jobs[1]).end({ kind: 'result', result: whole })
    expect(job.status.value).toBe('current')
  })

  it('says when a run was cancelled before it had anything', async () => {
    const { jobs, job } = started()
    job.run()
    job.cancel()
    await need(jobs[0]).end({ kind: 'cancelled' })
    expect(job.status.value).toBe('failed')
    expect(job.failure.value?.message).toMatch(/cancelled before/)
  })

  it('tells a failure with its field only while the inputs that failed stand', async () => {
    const { plan, jobs, job } = started()
    job.run()
    const result: RunResult = { status: 'failed', message: 'must be smaller', field: 'ambient.axialFlow', data: null }
    await need(jobs[0]).end({ kind: 'result', result })
    expect(job.status.value).toBe('failed')
    expect(job.failure.value).toEqual({ field: 'ambient.axialFlow', message: 'must be smaller' })
    plan.value = setField(PLAN, 'ambient.axialFlow', 0.001)
    expect(job.failure.value).toBeNull()
  })

  it('starts another run only when the one before has let go of the worker', async () => {
    const { plan, jobs, job } = started()
    job.run()
    plan.value = setField(PLAN, 'programme.stroke', 0.04)
    job.run()
    expect(jobs).toHaveLength(1)
    expect(need(jobs[0]).cancelled).toBe(true)
    await need(jobs[0]).end({ kind: 'result', result: part })
    expect(jobs.map((each) => each.plan.programme.stroke)).toEqual([0.03, 0.04])
    expect(job.finished.value).toBeNull()
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

describe('sameJet', () => {
  it('does not look at what the jet does not read', () => {
    expect(sameJet(PLAN, setTitle(PLAN, 'other'))).toBe(true)
    expect(sameJet(PLAN, setField(PLAN, 'train.pulses', 3))).toBe(true)
    expect(sameJet(PLAN, setField(PLAN, 'ambient.axialFlow', 0.001))).toBe(false)
    expect(sameJet(PLAN, setJet(PLAN, { coreGrowth: false }))).toBe(false)
  })
})
