/**
 * Documents of the open plan that can be printed: each is one maker here, and the print dialog lists what they give.
 */
import { canonicalInput, type Plan } from '../../core/plan'
import { comparisonRecord, designRecord, runSheet, type Paper, type PrintDocument } from '../../core/report'
import { recordDataOf } from './recordData'
import type { Workspace } from './workspace'

declare const __RINGWRIGHT_VERSION__: string

/** What a document bears that is not the plan's. */
export interface PrintStamp {
  readonly date: string
  /** Program, version and the hash of the inputs. */
  readonly foot: string
  /** SHA-256 of the plan's canonical input; '' where it cannot be had. */
  readonly inputHash: string
}

export interface Printable {
  readonly id: string
  readonly title: string
  /** Why it cannot be made yet, in a sentence; null where it can. */
  readonly hindrance: string | null
  make(stamp: PrintStamp): PrintDocument | null
}

type Maker = (workspace: Workspace) => Printable

const tankRunSheet: Maker = ({ tank, units, document }) => ({
  id: 'run-sheet',
  title: 'Run sheet',
  hindrance:
    document.content.value.tankRun === null
      ? 'The run sheet needs a tank run: begin one on the Tank run page.'
      : // One of an earlier plan would bear the hash of this one.
        tank.planned.value?.plan !== document.content.value
        ? 'The tank run is not planned yet: see its page for what it still needs.'
        : null,
  make({ date, foot }) {
    const held = tank.planned.value
    return held === null
      ? null
      : runSheet({ ...held, units: units.value, spread: tank.spread.value?.quantities ?? [], date, foot })
  },
})

const record: Maker = (workspace) => {
  const data = recordDataOf(workspace)
  return {
    id: 'design-record',
    title: 'Design record',
    hindrance: data === null ? 'There are no results yet: give the plan what it still needs first.' : null,
    make({ date, inputHash }) {
      const program = { name: 'Ringwright', version: __RINGWRIGHT_VERSION__ }
      return data === null ? null : designRecord(workspace.document.plan.value, data, { date, program, inputHash })
    },
  }
}

const comparison: Maker = ({ readings, document }) => ({
  id: 'comparison',
  title: 'Comparison with readings',
  hindrance: !readings.begun.value
    ? 'The comparison needs readings: bring some on the Readings page.'
    : readings.quick.status.value !== 'current'
      ? 'The readings are not compared yet: see their page for what it still needs.'
      : null,
  make({ date, inputHash }) {
    const held = readings.compared.value
    const program = { name: 'Ringwright', version: __RINGWRIGHT_VERSION__ }
    return held === null
      ? null
      : comparisonRecord(document.plan.value, held.result, held.data.pulse, { date, program, inputHash })
  },
})

const MAKERS: readonly Maker[] = [record, tankRunSheet, comparison]

export function printables(workspace: Workspace): readonly Printable[] {
  return MAKERS.map((maker) => maker(workspace))
}

/** `3 December 2026`, in the words of the program's language. */
export function dateText(now: Date): string {
  return new Intl.DateTimeFormat('en-GB', { dateStyle: 'long' }).format(now)
}

/** Program, version and the hash that the runner writes as inputHash. */
export async function stampOf(plan: Plan): Promise<Omit<PrintStamp, 'date'>> {
  const program = `Ringwright ${__RINGWRIGHT_VERSION__}`
  // Absent outside a secure context.
  const digest = await globalThis.crypto?.subtle?.digest('SHA-256', new TextEncoder().encode(canonicalInput(plan)))
  if (digest === undefined) return { foot: program, inputHash: '' }
  const inputHash = Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('')
  return { foot: `${program}, inputs ${inputHash}`, inputHash }
}

const PAPER_KEY = 'ringwright.paper'

/** The paper chosen last; at first what the language of the system usually prints on. */
export function keptPaper(storage: Pick<Storage, 'getItem'> | null, language: string): Paper {
  const kept = storage?.getItem(PAPER_KEY) ?? null
  if (kept === 'A4' || kept === 'Letter') return kept
  return /^(?:en-US|en-CA|es-MX|fil)/u.test(language) ? 'Letter' : 'A4'
}

export function keepPaper(storage: Pick<Storage, 'setItem'> | null, paper: Paper): void {
  storage?.setItem(PAPER_KEY, paper)
}
