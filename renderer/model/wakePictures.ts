/**
 * Dye and field of the wake shown: computed when the picture asks for them, in a worker of their own, and let go with the run
 * they belong to.
 */
import { shallowRef, type ShallowRef } from 'vue'
import type { Progress } from '../../core/base'
import type { WakePicture, WakePictureRequest } from '../../core/run'
import type { Job, PictureOutcome, WorkerClient } from '../worker/client'
import type { FinishedWake } from './wakeJob'

/** Points of dye over all rings. */
export const DYE_POINTS = 3000

export interface MadePicture {
  readonly of: FinishedWake
  readonly request: WakePictureRequest
  readonly picture: WakePicture
}

export interface WakePictures {
  /** What was computed, and of which run; null while there is nothing. */
  readonly made: Readonly<ShallowRef<MadePicture | null>>
  readonly progress: Readonly<ShallowRef<Progress | null>>
  /** Ask for what the picture shows; what is asked for later stands, what runs for less is stopped. */
  ask(of: FinishedWake | null, request: WakePictureRequest): void
}

interface Wanted {
  readonly of: FinishedWake
  readonly request: WakePictureRequest
}

/** @param onFailure told once a failure, with a sentence */
export function createWakePictures(client: WorkerClient, onFailure: (sentence: string) => void): WakePictures {
  const made = shallowRef<MadePicture | null>(null)
  const progress = shallowRef<Progress | null>(null)
  let running: { readonly wanted: Wanted; readonly job: Job<PictureOutcome> } | null = null
  let wanted: Wanted | null = null

  function start(next: Wanted): void {
    const job = client.picture(next.of.plan, next.of.wake, next.request, (step) => {
      if (running?.job === job) progress.value = step
    })
    running = { wanted: next, job }
    progress.value = { share: 0, what: 'starting' }
    void job.outcome.then((outcome) => {
      running = null
      progress.value = null
      // Only the last question counts.
      if (wanted === next) settle(next, outcome)
      else if (wanted !== null) start(wanted)
    })
  }

  function settle({ of, request }: Wanted, outcome: PictureOutcome): void {
    if (outcome.kind === 'picture' && outcome.picture.status === 'done')
      made.value = { of, request, picture: outcome.picture }
    else if (outcome.kind === 'crashed') onFailure(`Dye or field could not be computed (${outcome.message}).`)
  }

  return {
    made,
    progress,
    ask(of, request) {
      const nothing = of === null || (request.dye === 0 && request.plane === null)
      if (made.value !== null && (nothing || made.value.of !== of)) made.value = null
      const there = made.value !== null && covers(made.value.request, request)
      wanted = nothing || there ? null : { of, request }
      if (running !== null) running.job.cancel()
      else if (wanted !== null) start(wanted)
    },
  }
}

/** Whether what was asked for before holds all that is asked for now. */
function covers(before: WakePictureRequest, now: WakePictureRequest): boolean {
  return (now.dye === 0 || now.dye === before.dye) && (now.plane === null || now.plane === before.plane)
}
