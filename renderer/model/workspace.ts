/**
 * Everything one window holds, made once and handed to its components by injection, so that a test can hand them its own.
 */
import {
  computed,
  inject,
  provide,
  ref,
  shallowRef,
  watch,
  type ComputedRef,
  type InjectionKey,
  type Ref,
  type ShallowRef,
} from 'vue'
import type { CommandId } from '../../app/contract'
import type { Problem } from '../../core/base'
import { validatePlan, type Plan } from '../../core/plan'
import type { Host } from '../host/types'
import type { WorkerClient } from '../worker/client'
import { createDocument, type PlanDocument } from './document'
import { createFiles, type Files, type LeaveAnswer } from './files'
import { createNotices, type Notices } from './notices'
import type { PageId } from './pages'
import { problemInWords } from './problemWords'
import { createRecovery, type Recovery, type RecoveryStorage } from './recovery'
import { magnitudesOf } from './resultRows'
import { createResults, type Results } from './results'
import type { ThemeStore } from './theme'
import { shownUnits, type Units } from './units'
import { createWakeJob, type WakeJob } from './wakeJob'
import { createWakePictures, type WakePictures } from './wakePictures'

export type DialogId = 'examples' | 'units' | 'export' | 'keys'

export interface LeaveQuestion {
  readonly title: string
  readonly answer: (answer: LeaveAnswer) => void
}

export interface Workspace {
  readonly host: Host
  readonly document: PlanDocument
  readonly results: Results
  /** The rings of the open plan in motion. */
  readonly wake: WakeJob
  /** Dye and field for the picture of the rings. */
  readonly wakePictures: WakePictures
  readonly units: ComputedRef<Units>
  /** What the open plan breaks; nothing is computed while there is any. */
  readonly problems: ComputedRef<readonly Problem[]>
  /** What a field of the plan breaks, in words, from the plan's own check or from the last wake; null for nothing. */
  refusalOf(field: string): string | null
  readonly theme: ThemeStore
  readonly notices: Notices
  readonly files: Files
  readonly recovery: Recovery
  readonly page: Ref<PageId>
  readonly dialog: Ref<DialogId | null>
  readonly leaving: Ref<LeaveQuestion | null>
  /** Takes the picture shown as a PNG; null where none is shown. */
  readonly picture: ShallowRef<(() => Promise<Uint8Array | null>) | null>
  /** The wake as it is shown, for its exports; null while it is not. */
  readonly shownWake: ShallowRef<ShownWake | null>
  /** Compute the open plan again. */
  refresh(): void
  /** What a menu entry, a key or a button asks for. */
  perform(command: CommandId): void
}

/** What is on the screen of the wake. */
export interface ShownWake {
  /** Number of the output shown. */
  readonly index: () => number
  /** The scene at that time as glTF text. */
  readonly toGltf: () => Promise<string | null>
}

export interface WorkspaceOptions {
  readonly host: Host
  readonly client: WorkerClient
  /** Marches wakes; its own worker, so that a long run keeps nothing waiting. */
  readonly wakeClient?: WorkerClient
  /** Computes dye and fields of finished wakes. */
  readonly pictureClient?: WorkerClient
  readonly theme: ThemeStore
  readonly plan: Plan
  /** Where a copy of unsaved changes is kept; null keeps none. */
  readonly storage: RecoveryStorage | null
  readonly now?: () => number
}

const KEY: InjectionKey<Workspace> = Symbol('workspace')

export function createWorkspace(options: WorkspaceOptions): Workspace {
  const { host, client, wakeClient = client, pictureClient = wakeClient, theme, plan, storage, now } = options
  const notices = createNotices()
  const document = createDocument(plan, now)
  const results = createResults(client, (sentence) => notices.fail(sentence))
  const wake = createWakeJob(
    wakeClient,
    () => document.content.value,
    (sentence) => notices.fail(sentence),
  )
  const wakePictures = createWakePictures(pictureClient, (sentence) => notices.fail(sentence))
  const page = ref<PageId>('stroke')
  const dialog = ref<DialogId | null>(null)
  const leaving = shallowRef<LeaveQuestion | null>(null)
  const problems = computed(() => validatePlan(document.content.value))
  const files = createFiles({
    host,
    document,
    notices,
    askToLeave: (title) =>
      new Promise((resolve) => {
        leaving.value = {
          title,
          answer(answer) {
            leaving.value = null
            resolve(answer)
          },
        }
      }),
  })

  function refresh(): void {
    if (problems.value.length === 0) results.request(document.content.value)
    else results.cancel()
  }
  watch(document.content, refresh, { immediate: true, flush: 'sync' })

  /** Compute what the page shows. */
  function run(): void {
    refresh()
    const shown = document.content.value
    if (page.value === 'wake' && shown.wake !== null && problems.value.length === 0) wake.run()
  }

  function refusalOf(field: string): string | null {
    const found = problems.value.find((candidate) => candidate.field === field)
    if (found !== undefined) return problemInWords(found.message)
    const failure = wake.failure.value
    return failure !== null && failure.field === field ? problemInWords(failure.message) : null
  }

  function perform(command: CommandId): void {
    const actions: Readonly<Record<CommandId, () => unknown>> = {
      'file.new': files.newPlan,
      'file.open': files.open,
      'file.save': files.save,
      'file.saveAs': files.saveAs,
      'file.export': () => (dialog.value = 'export'),
      'file.examples': () => (dialog.value = 'examples'),
      'edit.undo': document.undo,
      'edit.redo': document.redo,
      'run.refresh': run,
      'view.stroke': () => (page.value = 'stroke'),
      'view.thrust': () => (page.value = 'thrust'),
      'view.wake': () => (page.value = 'wake'),
      'view.tankRun': () => (page.value = 'tankRun'),
      'view.readings': () => (page.value = 'readings'),
      'view.units': () => (dialog.value = 'units'),
      'help.keys': () => (dialog.value = 'keys'),
    }
    void actions[command]()
  }

  return {
    host,
    document,
    results,
    wake,
    wakePictures,
    units: computed(() => {
      const pulse = results.finished.value?.data.pulse ?? null
      return shownUnits(document.units.value, pulse === null ? {} : magnitudesOf(pulse))
    }),
    problems,
    refusalOf,
    theme,
    notices,
    files,
    recovery: createRecovery(document, storage),
    page,
    dialog,
    leaving,
    picture: shallowRef(null),
    shownWake: shallowRef(null),
    refresh,
    perform,
  }
}

export function provideWorkspace(workspace: Workspace): void {
  provide(KEY, workspace)
}

/** The key itself, for tests that mount one component. */
export const WORKSPACE_KEY = KEY

/** @throws {Error} outside a component below the window's root */
export function useWorkspace(): Workspace {
  const workspace = inject(KEY)
  if (workspace === undefined) throw new Error('useWorkspace needs a window that provides a workspace')
  return workspace
}
