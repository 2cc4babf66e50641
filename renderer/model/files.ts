/**
 * Opening and saving: what the commands of the file menu do, in every face alike.
 */
import {
  defaultPlan,
  EXAMPLES,
  planFileName,
  readPlan,
  readProgrammeCsv,
  setRows,
  unknownKeysInWords,
  validatePlan,
  writePlan,
  type Example,
  type Plan,
} from '../../core/plan'
import { isFailure, type Host, type HostFailure, type OpenedPlanFile, type PlanFile } from '../host/types'
import type { PlanDocument } from './document'
import { exitPerPiston } from '../../core/pulse'
import type { Notices } from './notices'

export type LeaveAnswer = 'save' | 'discard' | 'cancel'

export interface Files {
  newPlan(): Promise<void>
  open(): Promise<void>
  openExample(id: string): Promise<void>
  openText(text: string, file: PlanFile | null): Promise<void>
  openDropped(file: File): Promise<void>
  /** Open what the system gave the program to open, one file after another, until none is left. */
  openGiven(): Promise<void>
  /** Read a table of time and speed or position into the programme. */
  openTable(): Promise<void>
  readTable(name: string, text: string): void
  save(): Promise<boolean>
  saveAs(): Promise<boolean>
}

export interface FilesContext {
  readonly host: Host
  readonly document: PlanDocument
  readonly notices: Notices
  /** Asks what to do with unsaved changes. */
  readonly askToLeave: (title: string) => Promise<LeaveAnswer>
  /** An example was opened: the window turns to what it is about. */
  readonly onExample: (example: Example) => void
}

/** Whether a dropped file is read as a table, by its name. */
export function isTable({ name }: { readonly name: string }): boolean {
  return /\.(csv|tsv|txt)$/iu.test(name)
}

/** Title shown for a plan, also where it has none. */
export function shownTitle(plan: Plan): string {
  return plan.title.trim() === '' ? 'Untitled plan' : plan.title
}

export function createFiles({ host, document, notices, askToLeave, onExample }: FilesContext): Files {
  async function mayLeave(): Promise<boolean> {
    if (!document.edited.value) return true
    const answer = await askToLeave(shownTitle(document.plan.value))
    if (answer === 'save') return store(document.file.value)
    return answer === 'discard'
  }

  async function store(file: PlanFile | null): Promise<boolean> {
    const plan = document.plan.value
    const content = document.content.value
    const saved = await host.savePlan(file, file?.name ?? planFileName(plan.title), writePlan(plan))
    if (saved === null) return false
    if (isFailure(saved)) {
      notices.fail(saved.failure)
      return false
    }
    // What was changed while the file was written is not on disk.
    if (document.content.value === content) document.markSaved(saved)
    notices.tell(`Saved as ${saved.name}.`)
    return true
  }

  /** @returns whether it is what is open now */
  async function show(text: string, name: string, file: PlanFile | null): Promise<boolean> {
    const reading = readPlan(text)
    if (!reading.ok) {
      notices.fail(
        `${name} was not opened: ${reading.problems[0]?.message ?? 'it is not a plan'}`,
        reading.problems.slice(1).map((problem) => problem.message),
      )
      return false
    }
    if (!(await mayLeave())) return false
    notices.clear()
    document.replace(reading.plan, file)
    const unknown = unknownKeysInWords(reading.plan)
    if (unknown !== null) notices.fail(`${name}: ${unknown}`)
    if (reading.migratedFrom !== null)
      notices.tell(`${name} was made by version ${reading.migratedFrom}; saving it writes the present version.`)
    return true
  }

  /** A plan is shown, a table read into the open one. */
  async function take(opened: OpenedPlanFile | HostFailure): Promise<void> {
    if (isFailure(opened)) notices.fail(opened.failure)
    else if (isTable(opened)) readTable(opened.name, opened.text)
    else await show(opened.text, opened.name, { token: opened.token, name: opened.name })
  }

  let taking: Promise<void> = Promise.resolve()
  async function takeGiven(): Promise<void> {
    const next = await host.givenPlan()
    if (next === null) return
    await take(next)
    // After a failure the rest waits for the next word of the shell: one that answers nothing any more would be asked for ever.
    if (!isFailure(next)) await takeGiven()
  }

  function readTable(name: string, text: string): void {
    const reading = readProgrammeCsv(text, exitPerPiston(document.content.value.nozzle))
    if (!reading.ok) {
      notices.fail(`${name} was not read: ${reading.message}`)
      return
    }
    const next = setRows(document.content.value, reading.rows)
    const problem = validatePlan(next).find((candidate) => candidate.field.startsWith('programme'))
    if (problem !== undefined) {
      notices.fail(`${name} was not read: ${problem.message}`)
      return
    }
    document.change('table', next)
    notices.clear()
    notices.tell(`Read ${reading.rows.length} rows from ${name} into the speed programme. ${reading.notes.join(' ')}`)
  }

  return {
    async newPlan() {
      if (await mayLeave()) document.replace(defaultPlan(), null)
    },
    async open() {
      const opened = await host.openPlan()
      if (opened === null) return
      if (isFailure(opened)) notices.fail(opened.failure)
      else await show(opened.text, opened.name, { token: opened.token, name: opened.name })
    },
    async openExample(id) {
      const example = EXAMPLES.find((candidate) => candidate.id === id)
      if (example !== undefined && (await show(example.text, example.title, null))) onExample(example)
    },
    async openText(text, file) {
      await show(text, file?.name ?? 'The text', file)
    },
    openDropped: async (file) => take(await host.openDropped(file)),
    openGiven() {
      // What comes while a question about an earlier one is open waits for its answer.
      taking = taking.catch(() => undefined).then(takeGiven)
      return taking
    },
    async openTable() {
      const opened = await host.openTable()
      if (opened === null) return
      if (isFailure(opened)) notices.fail(opened.failure)
      else readTable(opened.name, opened.text)
    },
    readTable,
    save: () => store(document.file.value),
    saveAs: () => store(null),
  }
}
