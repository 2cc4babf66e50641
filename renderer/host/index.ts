/**
 * Where the program runs, as the window sees it: the desktop bridge or the browser behind one interface.
 */
import { createBrowserHost, type Page } from './browser'
import { createDesktopHost, findBridge } from './desktop'
import type { Host } from './types'

export {
  isFailure,
  type ChosenFile,
  type DocumentState,
  type Host,
  type HostFailure,
  type OpenedPlanFile,
  type PlanFile,
} from './types'

/** The host of a page: through the bridge where the preload put one there, else the browser itself. */
export function createHost(page: Page): Host {
  const bridge = findBridge(page)
  return bridge === null ? createBrowserHost(page) : createDesktopHost(bridge)
}
