/**
 * Velocity fields read file by file: the next one is fetched while the worker analyses the last, so that neither memory nor the window
 * depends on how many there are. A cancelled reading keeps what was analysed by then.
 */
import { computed, shallowRef, type ComputedRef, type ShallowRef } from 'vue'
import type { FieldFrameChoices, Plan, ReadingsChoices, ReadingsReading } from '../../../core/plan'
import type { AnalysedField } from '../../../core/run'
import type { FieldResult, ReadingsColumn } from '../../../core/tank'
import { isFailure, type ChosenFile } from '../../host/types'
import type { WorkerClient } from '../../worker/client'
import type { FieldAnswer, FieldStep } from '../../worker/fieldSteps'

/** Most frames of one run in the window. */
export const MOST_FRAMES = 2000

export interface FieldFile {
  readonly file: ChosenFile
  /** Of its first frame where the file tells no time, and from frame to frame in it [s]. */
  readonly time: number
  readonly step: number
}

/** Files as frames of one run: one after another where there are several, else all in the one. @param first, step of frames that tell no time [s] */
export function fieldFilesOf(files: readonly ChosenFile[], first: number, step: number): readonly FieldFile[] {
  return files.map((file, index) => ({ file, time: first + index * step, step }))
}

export interface ShownFrame extends AnalysedField {
  readonly name: string
}

export interface FieldReading {
  readonly plan: Plan
  /** At rising times. */
  readonly frames: readonly ShownFrame[]
  readonly result: FieldResult
  /** Files read, with their hashes, and columns as they were read. */
  readonly files: readonly { readonly name: string; readonly hash: string }[]
  readonly columns: readonly ReadingsColumn[]
  /** Files left out, a sentence each. */
  readonly skipped: readonly string[]
  /** True where it was stopped before its last file. */
  readonly partial: boolean
}

export interface FieldJob {
  readonly finished: Readonly<ShallowRef<FieldReading | null>>
  readonly progress: Readonly<
    ShallowRef<{ readonly done: number; readonly total: number; readonly name: string } | null>
  >
  /** Why nothing could be read, in a sentence. */
  readonly failure: Readonly<ShallowRef<string | null>>
  /** Whether files are at hand for another analysis. */
  readonly canRepeat: ComputedRef<boolean>
  read(files: readonly FieldFile[], choices: FieldFrameChoices): Promise<FieldReading | null>
  /** The same files again, for the plan as it is now. */
  repeat(): Promise<FieldReading | null>
  /** A whole table of other readings, which may be long. */
  readTable(text: string, choices: ReadingsChoices): Promise<ReadingsReading>
  cancel(): void
  forget(): void
}

export function createFieldJob(client: WorkerClient, open: () => Plan): FieldJob {
  const finished = shallowRef<FieldReading | null>(null)
  const progress = shallowRef<{ readonly done: number; readonly total: number; readonly name: string } | null>(null)
  const failure = shallowRef<string | null>(null)
  const last = shallowRef<{ readonly files: readonly FieldFile[]; readonly choices: FieldFrameChoices } | null>(null)
  /** Which reading goes on; another number ends the one before. */
  let turn = 0

  async function ask(step: FieldStep): Promise<FieldAnswer> {
    const outcome = await client.fields(step).outcome
    if (outcome.kind === 'fields') return outcome.answer
    return {
      ok: false,
      message: outcome.kind === 'crashed' ? `the analysis stopped (${outcome.message})` : 'it was stopped',
    }
  }

  async function analyse(files: readonly FieldFile[], choices: FieldFrameChoices): Promise<FieldReading | null> {
    const own = (turn += 1)
    const plan = open()
    const list = files.slice(0, MOST_FRAMES)
    last.value = { files: list, choices }
    failure.value = null
    progress.value = { done: 0, total: list.length, name: list[0]?.file.name ?? '' }
    const begun = await ask({ do: 'begin', plan })
    if (!begun.ok) return stop(begun.message)
    const frames: ShownFrame[] = []
    const skipped: string[] = []
    const read: { readonly name: string; readonly hash: string }[] = []
    let columns: readonly ReadingsColumn[] = []
    if (files.length > list.length)
      skipped.push(`At most ${MOST_FRAMES} frames are read: the last ${files.length - list.length} are left out.`)
    let next = list[0]?.file.read()
    for (const [index, { file, time, step }] of list.entries()) {
      const bytes = await next
      next = list[index + 1]?.file.read()
      if (own !== turn) break
      progress.value = { done: index, total: list.length, name: file.name }
      if (bytes === undefined) continue
      if (isFailure(bytes)) {
        skipped.push(bytes.failure)
        continue
      }
      const answer = await ask({ do: 'file', bytes, time, step, choices })
      if (!answer.ok) skipped.push(`${file.name}: ${answer.message}`)
      else if (answer.file !== null) {
        frames.push(...answer.file.frames.map((frame) => ({ name: file.name, ...frame })))
        skipped.push(...answer.file.skipped.map((text) => `${file.name}: ${text}`))
        read.push({ name: file.name, hash: answer.file.hash })
        columns = answer.file.columns
      }
    }
    const partial = own !== turn
    // Another reading has begun and has the worker's session.
    if (partial && progress.value !== null) return null
    const ended = await ask({ do: 'end' })
    if (!ended.ok || ended.result === null || frames.length === 0)
      return stop(skipped[0] ?? (ended.ok ? 'No frame was read.' : ended.message))
    progress.value = null
    frames.sort((a, b) => a.numbers.time - b.numbers.time)
    finished.value = { plan, frames, result: ended.result, files: read, columns, skipped, partial }
    return finished.value
  }

  function stop(message: string): null {
    progress.value = null
    failure.value = `No velocity field was read. ${message}`
    return null
  }

  return {
    finished,
    progress,
    failure,
    canRepeat: computed(() => last.value !== null && progress.value === null),
    read: analyse,
    repeat: () => (last.value === null ? Promise.resolve(null) : analyse(last.value.files, last.value.choices)),
    async readTable(text, choices) {
      const answer = await ask({ do: 'table', text, choices })
      if (!answer.ok) return answer
      return answer.table ?? { ok: false, message: 'The table was not read.' }
    },
    cancel() {
      if (progress.value === null) return
      turn += 1
      progress.value = null
    },
    forget() {
      turn += 1
      progress.value = null
      finished.value = null
      last.value = null
      failure.value = null
    },
  }
}
