import { expect } from 'vitest'
import { nextTick } from 'vue'
import type { Plan } from '../../../core/plan'
import type { JobOutcome, WorkerClient } from '../../../renderer/worker/client'

export interface HeldJob {
  readonly plan: Plan
  readonly sections: readonly string[]
  cancelled: boolean
  end(outcome: JobOutcome): Promise<void>
  progress(share: number): void
}

/**
 * A client whose jobs end when the test says so; it is asked for runs only.
 * @param what is under way, in words
 * @param section that every run must ask for
 */
export function heldClient(what: string, section?: string) {
  const jobs: HeldJob[] = []
  const refuse = () => expect.unreachable('nothing but a run is asked for')
  const client: WorkerClient = {
    run(plan, sections, onProgress) {
      if (section !== undefined) expect(sections).toContain(section)
      let settle: (outcome: JobOutcome) => void = () => undefined
      const outcome = new Promise<JobOutcome>((resolve) => (settle = resolve))
      const job: HeldJob = {
        plan,
        sections,
        cancelled: false,
        async end(result) {
          settle(result)
          await outcome
          await nextTick()
        },
        progress: (share) => onProgress?.({ share, what }),
      }
      jobs.push(job)
      return { outcome, cancel: () => (job.cancelled = true) }
    },
    picture: refuse,
    map: refuse,
    fields: refuse,
    dispose: () => undefined,
  }
  return { client, jobs }
}
