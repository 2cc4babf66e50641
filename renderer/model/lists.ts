/**
 * The parts lists of this program: kept beside it, never in a plan, and carried from one program to another as a file.
 */
import { shallowRef, type ShallowRef } from 'vue'
import {
  LIST_KINDS,
  LISTS_ENDING,
  mergeLists,
  NO_PARTS,
  putIntoPlan,
  readLists,
  sampleLists,
  takeFromPlan,
  withoutPart,
  withPart,
  withPartNamed,
  writeLists,
  type ListEntry,
  type ListKind,
  type MergedLists,
  type PartsLists,
} from '../../core/plan'
import type { PlanDocument } from './document'

const STORAGE_KEY = 'ringwright.lists'
/** Where lists are put that could not be read, before they are written over. */
const UNREAD_KEY = 'ringwright.lists.unread'
export const LISTS_FILE = `parts${LISTS_ENDING}`

export type ListsStorage = Pick<Storage, 'getItem' | 'setItem'>

export interface Lists {
  readonly lists: Readonly<ShallowRef<PartsLists>>
  /** Why the kept lists are not shown, or the last change is not kept, in a sentence; null where nothing is wrong. */
  readonly failure: Readonly<ShallowRef<string | null>>
  /** What a removal took away last; null where nothing can be put back. */
  readonly removed: Readonly<ShallowRef<{ readonly kind: ListKind; readonly name: string } | null>>
  /** Copy a part into the plan as one step of undo. @returns why not, in a sentence, or null */
  use(kind: ListKind, entry: ListEntry): string | null
  /** Keep the plan's present part under a name. @returns the name it got, or null where the plan has none */
  keep(kind: ListKind, name: string): string | null
  rename(kind: ListKind, name: string, next: string): void
  remove(kind: ListKind, name: string): void
  /** Put back what the last removal took. */
  putBack(): void
  addSamples(): void
  /** Join the lists of a file. @returns a sentence on what came of it */
  importText(name: string, text: string): { readonly text: string; readonly failed: boolean }
  /** The text of a lists file. */
  text(): string
}

export function createLists(document: PlanDocument, storage: ListsStorage | null): Lists {
  const kept = storage?.getItem(STORAGE_KEY) ?? null
  const reading = kept === null ? null : readLists(kept)
  const lists = shallowRef<PartsLists>(reading?.ok === true ? reading.lists : NO_PARTS)
  const failure = shallowRef<string | null>(
    reading?.ok === false
      ? `The parts lists kept by this program were not read: ${reading.problems[0]?.message ?? 'they are damaged'}`
      : null,
  )
  const removed = shallowRef<{ readonly kind: ListKind; readonly name: string } | null>(null)
  let before: PartsLists | null = null
  let unread = reading?.ok === false ? kept : null

  function change(next: PartsLists): void {
    lists.value = next
    before = null
    removed.value = null
    try {
      if (unread !== null) storage?.setItem(UNREAD_KEY, unread)
      unread = null
      storage?.setItem(STORAGE_KEY, writeLists(next))
      failure.value = null
    } catch {
      failure.value = 'The lists were changed but could not be kept: the storage is full. Export them to a file.'
    }
  }

  return {
    lists,
    failure,
    removed,
    use(kind, entry) {
      const { one } = LIST_KINDS[kind]
      const next = putIntoPlan(document.content.value, kind, entry)
      if (next === null) return placeless(kind)
      document.change(`${one} from list`, next)
      return null
    },
    keep(kind, name) {
      const entry = takeFromPlan(document.content.value, kind, name)
      if (entry === null) return null
      change(withPart(lists.value, kind, entry))
      return lists.value[kind].at(-1)?.name ?? null
    },
    rename: (kind, name, next) => change(withPartNamed(lists.value, kind, name, next)),
    remove(kind, name) {
      const held = lists.value
      change(withoutPart(held, kind, name))
      before = held
      removed.value = { kind, name }
    },
    putBack() {
      if (before !== null) change(before)
    },
    addSamples: () => change(mergeLists(lists.value, sampleLists()).lists),
    importText(name, text) {
      const found = readLists(text)
      if (!found.ok)
        return {
          text: `${name} was not read: ${found.problems[0]?.message ?? 'it holds no parts lists'}`,
          failed: true,
        }
      const merged = mergeLists(lists.value, found.lists)
      change(merged.lists)
      return { text: `${name}: ${importWords(merged)}`, failed: false }
    },
    text: () => writeLists(lists.value),
  }
}

function importWords({ added, renamed }: MergedLists): string {
  if (added === 0) return 'nothing that the lists do not have already.'
  const parts = added === 1 ? '1 part added' : `${added} parts added`
  return renamed === 0 ? `${parts}.` : `${parts}, ${renamed} of them under a name with a number: theirs was taken.`
}

/** Why a part finds no place in the plan. */
export function placeless(kind: ListKind): string {
  const { path, one } = LIST_KINDS[kind]
  if (path.startsWith('thruster'))
    return `The plan has no thrusters to put this ${one} on: begin them on the Thrust page.`
  if (path.startsWith('tankRun')) return `The plan has no tank run for this ${one}: begin one on the Tank run page.`
  return `This ${one} is refused by the plan.`
}
