/** The five pages, in the order of the work, and the page the address names. */
import type { CommandId } from '../../app/contract'

export const PAGES = {
  stroke: { title: 'Stroke', command: 'view.stroke' },
  thrust: { title: 'Thrust', command: 'view.thrust' },
  wake: { title: 'Wake', command: 'view.wake' },
  tankRun: { title: 'Tank run', command: 'view.tankRun' },
  readings: { title: 'Readings', command: 'view.readings' },
} as const satisfies Readonly<Record<string, { readonly title: string; readonly command: CommandId }>>
export type PageId = keyof typeof PAGES

export const PAGE_IDS: readonly PageId[] = ['stroke', 'thrust', 'wake', 'tankRun', 'readings']

/** Page of an address such as `#wake`; the first page for anything else. */
export function pageOfHash(hash: string): PageId {
  return PAGE_IDS.find((id) => hash === `#${id}`) ?? 'stroke'
}
