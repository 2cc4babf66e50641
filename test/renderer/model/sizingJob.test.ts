import { beforeAll, describe, expect, it } from 'vitest'
import { nextTick, shallowRef } from 'vue'
import { examplePlan, setDesign, setField, setThruster, setTitle, type Plan } from '../../../core/plan'
import { run, type RunResult } from '../../../core/run'
import { designKey } from '../../../renderer/model/designKey'
import { createSizingJob } from '../../../renderer/model/sizingJob'
import { heldClient } from './heldClient'

/** One nozzle in stock: the search has little to look through. */
const BASE = examplePlan('survey-vehicle')
const SEARCH = BASE.thruster?.search ?? null
const PLAN = setThruster(BASE, {
  search: SEARCH && { ...SEARCH, count: [2, 2], stock: { diameters: [0.05], strokes: [] } },
})

let whole: RunResult
let part: RunResult
beforeAll(async () => {
  whole = await run(PLAN, { sections: ['thruster'] })
  let asked = 0
  const signal = {
    get aborted() {
      asked += 1
      return asked > 40
    },
  }
  part = await run(PLAN, { sections: ['thruster'] }, { signal })
}, 60_000)

function started(plan = shallowRef(PLAN)) {
  const { client, jobs } = heldClient('candidates', 'thruster')
  const crashes: string[] = []
  return {
    job: createSizingJob(
      client,
      () => plan.value,
      (sentence) => crashes.push(sentence),
    ),
    jobs,
    crashes,
    plan,
  }
}

describe('the sizing of the open plan', () => {
  it('shows how far it is, keeps what it found, and opening a candidate leaves it current', async () => {
    const { job, jobs, plan } = started()
    expect(job.status.value).toBe('none')
    job.run()
    jobs[0]?.progress(0.3)
    expect(job.status.value).toBe('running')
    expect(job.progress.value?.share).toBe(0.3)
    await jobs[0]?.end({ kind: 'result', result: whole })
    expect(job.status.value).toBe('current')
    const [candidate] = job.finished.value?.sizing.candidates ?? []
    const [point] = candidate?.points ?? []
    if (candidate === undefined || point === undefined) throw new Error('nothing found')
    plan.value = setDesign(plan.value, { ...candidate.design, ...point })
    expect(job.status.value).toBe('current')
    plan.value = setTitle(plan.value, 'another name')
    expect(job.status.value).toBe('current')
  })

  it('is stale after a change of what the search reads, and current again after a step back', async () => {
    const { job, jobs, plan } = started()
    job.run()
    await jobs[0]?.end({ kind: 'result', result: whole })
    plan.value = setField(PLAN, 'thruster.actuator.maxForce', 20)
    expect(job.status.value).toBe('stale')
    plan.value = PLAN
    expect(job.status.value).toBe('current')
  })

  it('keeps the part that a cancelled search had found, or says that there was none', async () => {
    const { job, jobs } = started()
    job.run()
    job.cancel()
    expect(jobs[0]?.cancelled).toBe(true)
    await jobs[0]?.end({ kind: 'result', result: part })
    expect(part.status).toBe('cancelled')
    const found = job.finished.value
    expect(job.status.value).toBe(found === null ? 'failed' : 'partial')
    if (found !== null) expect(found.partial).toMatch(/^Cancelled/)
    job.run()
    await jobs[1]?.end({ kind: 'cancelled' })
    expect(job.failure.value?.message).toMatch(/cancelled before/)
  })

  it('starts anew when it is asked again meanwhile, and drops the first', async () => {
    const { job, jobs } = started()
    job.run()
    job.run()
    expect(jobs).toHaveLength(1)
    expect(jobs[0]?.cancelled).toBe(true)
    await jobs[0]?.end({ kind: 'result', result: part })
    await nextTick()
    expect(jobs).toHaveLength(2)
    expect(job.finished.value).toBeNull()
    await jobs[1]?.end({ kind: 'result', result: whole })
    expect(job.status.value).toBe('current')
  })

  it('tells a refusal with its field and a crash once', async () => {
    const { job, jobs, crashes } = started()
    job.run()
    const refused = await run(setThruster(PLAN, { target: [] }), { sections: ['thruster'] })
    expect(refused.data?.thruster?.sizing).toBeNull()
    await jobs[0]?.end({
      kind: 'result',
      result: {
        status: 'failed',
        message: 'thruster.target must hold a duty point',
        field: 'thruster.target',
        data: null,
      },
    })
    expect(job.failure.value).toEqual({ field: 'thruster.target', message: 'thruster.target must hold a duty point' })
    job.run()
    await jobs[1]?.end({ kind: 'crashed', message: 'out of memory' })
    expect(crashes).toHaveLength(1)
    expect(job.status.value).toBe('failed')
  })
})

describe('designKey', () => {
  it('does not change with the design, and does with what a search reads', () => {
    const moved = setDesign(PLAN, { diameter: 0.041, strokeRatio: 3.3, count: 3, frequency: 1.7, duration: 0.13 })
    expect(designKey(moved)).toBe(designKey(PLAN))
    const others: readonly Plan[] = [
      setField(PLAN, 'nozzle.pistonDiameter', 0.11),
      setField(PLAN, 'thruster.actuator.ejectShare', 0.4),
      setField(PLAN, 'water.depth', 3),
    ]
    for (const other of others) expect(designKey(other)).not.toBe(designKey(PLAN))
  })

  it('keeps the shares of ramps that a trapezoid reaches', () => {
    const programme = { ...PLAN.programme, shape: 'trapezoid', riseTime: 0.1, fallTime: 0.3, peakSpeed: 5 } as const
    const short: Plan = { ...PLAN, programme }
    const moved = setDesign(short, { diameter: 0.04, strokeRatio: 5, count: 2, frequency: 2, duration: 0.2 })
    expect(designKey(moved)).toBe(designKey(short))
  })
})
