import { describe, expect, it } from 'vitest'
import { examplePlan, setField, setSpread, setTitle, type Plan } from '../../../core/plan'
import { run } from '../../../core/run'
import { createSpreadJob, drawsAnything, sameSpread } from '../../../renderer/model/spreadJob'
import type { JobOutcome, WorkerClient } from '../../../renderer/worker/client'

const PLAN = setSpread(examplePlan('tank-day'), { relative: { 'programme.peakSpeed': 0.01 }, samples: 4 })

/** A client that answers when the test lets it. */
function heldClient() {
  const open: { readonly plan: Plan; readonly settle: (outcome: JobOutcome) => void; cancelled: boolean }[] = []
  const refuse = (): never => {
    throw new Error('not asked for here')
  }
  const client: WorkerClient = {
    run(plan) {
      let settle: (outcome: JobOutcome) => void = () => undefined
      const outcome = new Promise<JobOutcome>((resolve) => (settle = resolve))
      const job = { plan, settle, cancelled: false }
      open.push(job)
      return { outcome, cancel: () => (job.cancelled = true) }
    },
    picture: refuse,
    map: refuse,
    fields: refuse,
    dispose: () => undefined,
  }
  return { client, open }
}

async function answer(plan: Plan): Promise<JobOutcome> {
  return { kind: 'result', result: await run(plan, { sections: ['spread'] }) }
}
const settled = () => new Promise((resolve) => setTimeout(resolve))

describe('the spread', () => {
  it('is current for its plan, stale once a sample would read something else, and current again after a step back', async () => {
    const { client, open } = heldClient()
    let shown = PLAN
    const job = createSpreadJob(client, () => shown)
    job.run()
    expect(job.status.value).toBe('running')
    open[0]?.settle(await answer(PLAN))
    await settled()
    expect(job.status.value).toBe('current')
    expect(job.finished.value?.spread.used).toBe(4)
    shown = setTitle(PLAN, 'another name')
    expect(sameSpread(shown, PLAN)).toBe(true)
    shown = setField(PLAN, 'programme.stroke', 0.05)
    expect(sameSpread(shown, PLAN)).toBe(false)
  })

  it('keeps what was drawn before a cancellation and marks it', async () => {
    const { client, open } = heldClient()
    const job = createSpreadJob(client, () => PLAN)
    job.run()
    job.cancel()
    expect(open[0]?.cancelled).toBe(true)
    const whole = await answer(PLAN)
    if (whole.kind !== 'result') throw new Error('no result')
    open[0]?.settle({ kind: 'result', result: { ...whole.result, status: 'cancelled', message: 'Cancelled: 4 of 9.' } })
    await settled()
    expect(job.status.value).toBe('partial')
    expect(job.finished.value?.partial).toBe('Cancelled: 4 of 9.')
  })

  it('says when it was cancelled before its first sample, and when it stopped by itself', async () => {
    const { client, open } = heldClient()
    const told: string[] = []
    const job = createSpreadJob(
      client,
      () => PLAN,
      (sentence) => told.push(sentence),
    )
    job.run()
    open[0]?.settle({ kind: 'cancelled' })
    await settled()
    expect(job.failure.value?.message).toMatch(/before its first sample/)
    job.run()
    open[1]?.settle({ kind: 'crashed', message: 'out of memory' })
    await settled()
    expect(job.status.value).toBe('failed')
    expect(told.join()).toContain('out of memory')
  })

  it('starts anew for the newest plan when it is asked for again while it runs', async () => {
    const { client, open } = heldClient()
    let shown = PLAN
    const job = createSpreadJob(client, () => shown)
    job.run()
    shown = setField(PLAN, 'programme.stroke', 0.05)
    job.run()
    expect(open[0]?.cancelled).toBe(true)
    open[0]?.settle({ kind: 'cancelled' })
    await settled()
    expect(open[1]?.plan).toBe(shown)
    expect(job.status.value).toBe('running')
  })

  it('needs something that is uncertain', () => {
    expect(drawsAnything(PLAN)).toBe(true)
    expect(drawsAnything(examplePlan('tank-day'))).toBe(false)
  })
})
