/**
 * Rings read from a file or pasted, looked at before they are taken into the plan's list. One for the window, so that a file may be
 * dropped wherever the Wake page stands.
 */
import { shallowRef, type ShallowRef } from 'vue'
import { readRingTable, SI_RING_UNITS, type Plan, type RingReading, type RingTableUnits } from '../../core/plan'
import type { WakeRing } from '../../core/filament'
import { isFailure, type Host } from '../host/types'
import type { PlanDocument } from './document'
import type { Notices } from './notices'
import type { Units } from './units'
import { withRings } from './wakeStart'

export interface OfferedRings {
  /** Where they come from, for sentences: a file's name or the clipboard. */
  readonly from: string
  readonly reading: RingReading
}

export interface RingOffer {
  /** What is looked at; null: nothing. */
  readonly offered: ShallowRef<OfferedRings | null>
  /** Cells that are pasted; bare columns are in the units shown. */
  paste(text: string, units: RingTableUnits): void
  /** Ask for a file and read it. */
  openFile(): Promise<void>
  /** Read a file dropped on the window. */
  drop(file: File): Promise<void>
  take(how: 'replace' | 'add', rings: readonly WakeRing[]): void
  leave(): void
}

export interface RingOfferContext {
  readonly host: Host
  readonly document: PlanDocument
  readonly notices: Notices
}

/** Units the columns of rings are shown in. */
export function ringUnits({ length, circulation, wakeTime }: Units): RingTableUnits {
  return {
    ...SI_RING_UNITS,
    circulation,
    radius: length,
    coreRadius: length,
    x: length,
    y: length,
    z: length,
    startTime: wakeTime,
  }
}

export const CLIPBOARD = 'the clipboard'

export function createRingOffer({ host, document, notices }: RingOfferContext): RingOffer {
  const offered = shallowRef<OfferedRings | null>(null)

  function read(opened: Awaited<ReturnType<Host['openTable']>>): void {
    if (opened === null) return
    if (isFailure(opened)) notices.fail(opened.failure)
    else offered.value = { from: opened.name, reading: readRingTable(opened.text) }
  }

  return {
    offered,
    paste(text, units) {
      offered.value = { from: CLIPBOARD, reading: readRingTable(text, units) }
    },
    async openFile() {
      read(await host.openTable())
    },
    async drop(file) {
      read(await host.openDropped(file))
    },
    take(how, rings) {
      const from = offered.value?.from ?? ''
      offered.value = null
      const plan: Plan = document.content.value
      const before = how === 'replace' ? [] : (plan.wake?.rings ?? [])
      document.change(from === CLIPBOARD ? 'rings pasted' : 'rings read', withRings(plan, [...before, ...rings]))
      if (from !== CLIPBOARD)
        notices.tell(`Read ${rings.length} ${rings.length === 1 ? 'ring' : 'rings'} from ${from} into the ring list.`)
    },
    leave() {
      offered.value = null
    },
  }
}
