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
import { setJet, validatePlan, type Plan } from '../../core/plan'
import type { Host } from '../host/types'
import type { WorkerClient } from '../worker/client'
import { createDocument, type PlanDocument } from './document'
import { createFiles, type Files, type LeaveAnswer } from './files'
import { withImprint } from './imprint'
import { createJetJob, type JetJob } from './jetJob'
import { createJetView, type JetView } from './jetView'
import { createLists, type Lists } from './lists'
import { createNotices, type Notices } from './notices'
import type { PageId } from './pages'
import { problemInWords } from './problemWords'
import { createReadings, type Readings } from './readings/readings'
import { createRingOffer, type RingOffer } from './ringOffer'
import { createRecovery, type Recovery, type RecoveryStorage } from './recovery'
import { magnitudesOf } from './resultRows'
import { createResults, type Results } from './results'
import { createTank, type Tank } from './tank'
import { inShownUnits } from './shownSentence'
import type { ThemeStore } from './theme'
import { createThrust, type Thrust } from './thrust'
import { thrustMagnitudes } from './thrustRows'
import { shownUnits, type Units } from './units'
import { createUntaken, type Untaken } from './untaken'
import { createWakeJob, type WakeJob } from './wakeJob'
import { createWakePictures, type WakePictures } from './wakePictures'

export type DialogId = 'examples' | 'units' | 'export' | 'keys' | 'about' | 'print' | 'lists'

export interface LeaveQuestion {
  readonly title: string
  readonly answer: (answer: LeaveAnswer) => void
}

export interface Workspace {
  readonly host: Host
  readonly document: PlanDocument
  readonly results: Results
  /** The starting jet of the open plan. */
  readonly jet: JetJob
  /** How it is shown. */
  readonly jetView: JetView
  /** The rings of the open plan in motion. */
  readonly wake: WakeJob
  /** Dye and field for the picture of the rings. */
  readonly wakePictures: WakePictures
  /** The thruster of the open plan: figures, sizing, map and what is held. */
  readonly thrust: Thrust
  /** The readings of the open plan against it. */
  readonly readings: Readings
  readonly units: ComputedRef<Units>
  /** What the open plan breaks; nothing is computed while there is any. */
  readonly problems: ComputedRef<readonly Problem[]>
  /** Entries that were refused and stand in their fields. */
  readonly untaken: Untaken
  /** Parts of the user's own. */
  readonly lists: Lists
  /** What a field of the plan breaks, in words, from the plan's own check or from the last wake; null for nothing. */
  refusalOf(field: string): string | null
  readonly theme: ThemeStore
  readonly notices: Notices
  readonly files: Files
  /** Rings read or pasted, before they are taken. */
  readonly ringOffer: RingOffer
  readonly recovery: Recovery
  readonly page: Ref<PageId>
  readonly dialog: Ref<DialogId | null>
  readonly leaving: Ref<LeaveQuestion | null>
  /** The tank run of the open plan and its spread. */
  readonly tank: Tank
  /** What the program keeps between its starts; null where it keeps nothing. */
  readonly storage: RecoveryStorage | null
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
  const { client, wakeClient = client, pictureClient = wakeClient, theme, plan, storage, now } = options
  const notices = createNotices()
  const document = createDocument(plan, now)
  const host = withImprint(options.host, () => document.content.value.title)
  const results = createResults(client, (sentence) => notices.fail(sentence))
  const wake = createWakeJob(
    wakeClient,
    () => document.content.value,
    (sentence) => notices.fail(sentence),
  )
  // On the worker of the results: it keeps finished jets, which these then read.
  const jet = createJetJob({
    client,
    open: () => document.content.value,
    onCrash: (sentence) => notices.fail(sentence),
    onDone: () => {
      refresh()
      tank.refresh()
    },
  })
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
    onExample(example) {
      page.value = example.page
      if (example.page === 'stroke') jetView.showing.value = document.content.value.jet !== null
    },
  })
  const ringOffer = createRingOffer({ host, document, notices })

  const tank = createTank({
    client,
    spreadClient: wakeClient,
    document,
    problems: () => problems.value,
    active: () => page.value === 'tankRun' || dialog.value === 'print',
    units: () => units.value,
    onCrash: (sentence) => notices.fail(sentence),
  })
  const readings = createReadings({
    client,
    // Velocity fields are read file by file, beside everything else.
    fieldClient: pictureClient,
    document,
    problems: () => problems.value,
    active: () => page.value === 'readings' || dialog.value === 'print',
    units: () => units.value,
    onCrash: (sentence) => notices.fail(sentence),
  })
  const thrust = createThrust({
    client,
    document,
    problems: () => problems.value,
    active: () => page.value === 'thrust' || dialog.value === 'print',
    units: () => units.value,
    onCrash: (sentence) => notices.fail(sentence),
  })

  function refresh(): void {
    if (problems.value.length === 0) results.request(document.content.value)
    else results.cancel()
  }
  watch(document.content, refresh, { immediate: true, flush: 'sync' })

  /** Compute what the page shows. */
  function run(): void {
    refresh()
    tank.refresh()
    readings.refresh()
    const shown = document.content.value
    if (problems.value.length > 0) return
    if (page.value === 'wake' && shown.wake !== null) wake.run()
    if (page.value === 'thrust') thrust.run()
    if (page.value === 'tankRun' && shown.tankRun !== null && tank.canSpread.value) tank.spreads.run()
    if (page.value === 'stroke' && jetView.showing.value && shown.absent.length === 0) formJet()
  }

  /** Compute the starting jet; a plan that has no such section gets one, so that the runner computes it too. */
  function formJet(): void {
    const shown = document.content.value
    if (shown.jet === null) document.change('starting jet', setJet(shown, {}))
    jet.run()
  }

  function refusalOf(field: string): string | null {
    const found = problems.value.find((candidate) => candidate.field === field)
    if (found !== undefined) return refusalInWords(field, found.message)
    const ofThrust = page.value === 'thrust' ? [thrust.quick, thrust.sizing, thrust.maps] : []
    const ofTank = page.value === 'tankRun' ? [tank.quick, tank.spreads] : []
    const failures = [wake, jet, ...ofThrust, ...ofTank].map((job) => job.failure.value)
    const failure = failures.find((candidate) => candidate?.field === field) ?? null
    return failure === null ? null : refusalInWords(field, failure.message)
  }

  /** What the lists and fields of the wake and the ranges of the search are told is in the units they are shown in. */
  function refusalInWords(field: string, message: string): string {
    return problemInWords(/^(?:wake|thruster\.search)\b/u.test(field) ? inShownUnits(message, units.value) : message)
  }

  function perform(command: CommandId): void {
    const actions: Readonly<Record<CommandId, () => unknown>> = {
      'file.new': files.newPlan,
      'file.open': files.open,
      'file.save': files.save,
      'file.saveAs': files.saveAs,
      'file.export': () => (dialog.value = 'export'),
      'file.print': () => (dialog.value = 'print'),
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
      'edit.lists': () => (dialog.value = 'lists'),
      'help.keys': () => (dialog.value = 'keys'),
      'help.about': () => (dialog.value = 'about'),
    }
    void actions[command]()
  }

  const units = computed(() => {
    const pulse = results.finished.value?.data.pulse ?? null
    const thruster = page.value === 'thrust' ? (thrust.quick.finished.value?.data.thruster ?? null) : null
    return shownUnits(document.units.value, {
      ...(pulse === null ? {} : magnitudesOf(pulse)),
      ...(thruster === null ? {} : thrustMagnitudes(thruster.result)),
    })
  })
  const jetView = createJetView(jet, () => units.value)

  return {
    host,
    document,
    results,
    jet,
    jetView,
    wake,
    wakePictures,
    readings,
    thrust,
    tank,
    lists: createLists(document, storage),
    storage,
    units,
    problems,
    untaken: createUntaken(),
    refusalOf,
    theme,
    notices,
    files,
    ringOffer,
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
