/** Parts of the window that are loaded when they are first shown, so that the window opens without them. */
import { defineAsyncComponent, h, type Component } from 'vue'

type Loader = () => Promise<{ readonly default: Component }>

const loaders: Loader[] = []

/** A component behind a dynamic import: says that it is loading, and what to do where it cannot be loaded. */
export function loadedLater(load: Loader): Component {
  loaders.push(load)
  return defineAsyncComponent({
    loader: async () => (await load()).default,
    delay: 200,
    loadingComponent: () => h('p', { class: 'loading', role: 'status' }, 'Loading…'),
    errorComponent: () =>
      h(
        'p',
        { class: 'loading', role: 'alert' },
        'This part of the program could not be loaded. Save the plan, then close and open the window again.',
      ),
  })
}

/** Load one after another what has not been shown yet, for the moment it is asked for. A failure is told when it is shown. */
export async function loadAhead(): Promise<void> {
  for (const load of loaders) await load().catch(() => undefined)
}
