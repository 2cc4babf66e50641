/**
 * What crosses between the window and its worker, and the port it crosses by.
 */
import type { Plan } from '../../core/plan'
import type { Progress } from '../../core/base'
import type {
  RunRequest,
  RunResult,
  ThrusterMapRequest,
  ThrusterMapResult,
  WakeData,
  WakePicture,
  WakePictureRequest,
} from '../../core/run'
import type { FieldAnswer, FieldStep } from './fieldSteps'

/** To the worker. */
export type WorkerRequest =
  | {
      readonly kind: 'run'
      readonly id: number
      readonly plan: Plan
      /** What is asked of core/run. */
      readonly asked: RunRequest
    }
  | {
      readonly kind: 'picture'
      readonly id: number
      readonly plan: Plan
      readonly data: WakeData
      readonly request: WakePictureRequest
    }
  | { readonly kind: 'map'; readonly id: number; readonly plan: Plan; readonly request: ThrusterMapRequest }
  | { readonly kind: 'fields'; readonly id: number; readonly step: FieldStep }
  | { readonly kind: 'cancel'; readonly id: number }

/** From the worker. `crashed`: the core threw, which it does for no valid input. */
export type WorkerAnswer =
  | { readonly kind: 'progress'; readonly id: number; readonly progress: Progress }
  | { readonly kind: 'result'; readonly id: number; readonly result: RunResult }
  | { readonly kind: 'picture'; readonly id: number; readonly picture: WakePicture }
  | { readonly kind: 'map'; readonly id: number; readonly map: ThrusterMapResult }
  | { readonly kind: 'fields'; readonly id: number; readonly answer: FieldAnswer }
  | { readonly kind: 'crashed'; readonly id: number; readonly message: string }

/** The part of a message port both sides use; a Worker, a worker's own scope and a MessagePort all offer it. */
export interface Port<Sent, Received> {
  /** @param handedOver memory that moves with the message instead of being copied: the sender has it no more */
  post(message: Sent, handedOver?: readonly ArrayBuffer[]): void
  /** The one listener; called with each message in order. */
  listen(listener: (message: Received) => void): void
}
