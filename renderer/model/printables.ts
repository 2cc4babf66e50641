/**
 * Documents of the open plan that can be printed: each is one maker here, and the print dialog lists what they give.
 */
import { canonicalInput, type Plan } from '../../core/plan'
import { runSheet, type Paper, type PrintDocument } from '../../core/report'
import type { Workspace } from './workspace'

declare const __RINGWRIGHT_VERSION__: string

/** What a document bears that is not the plan's. */
export interface PrintStamp {
  readonly date: string
  /** Program, version and the hash of the inputs. */
  readonly foot: string
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
      : tank.planned.value === null
        ? 'The tank run is not planned yet: see its page for what it still needs.'
        : null,
  make({ date, foot }) {
    const held = tank.planned.value
    return held === null
      ? null
      : runSheet({ ...held, units: units.value, spread: tank.spread.value?.quantities ?? [], date, foot })
  },
})

const MAKERS: readonly Maker[] = [tankRunSheet]

export function printables(workspace: Workspace): readonly Printable[] {
  return MAKERS.map((maker) => maker(workspace))
}

/** `3 December 2026`, in the words of the program's language. */
export function dateText(now: Date): string {
  return new Intl.DateTimeFormat('en-GB', { dateStyle: 'long' }).format(now)
}

/** Program, version and the first digits of the hash that the runner writes as inputHash. */
export async function footText(plan: Plan): Promise<string> {
  const program = `Ringwright ${__RINGWRIGHT_VERSION__}`
  // Absent outside a secure context.
  const digest = await globalThis.crypto?.subtle?.digest('SHA-256', new TextEncoder().encode(canonicalInput(plan)))
  if (digest === undefined) return program
  const hash = Array.from(new Uint8Array(digest), (byte) => byte.toString(16).padStart(2, '0')).join('')
  return `${program}, inputs ${hash}`
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
