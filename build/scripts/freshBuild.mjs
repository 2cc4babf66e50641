/** Browser tests run what is built: build first what is stale, also when they are started by themselves. */
import { ensureBuilt } from './bundle.mjs'
import { tell } from './root.mjs'

export async function setup() {
  try {
    await ensureBuilt(['app', 'renderer'])
  } catch (error) {
    // The tests that need the build fail and say so; the others still run.
    tell(error instanceof Error ? error.message : String(error))
  }
}
