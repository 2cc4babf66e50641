/** npm run typecheck: every room against only the types it may see. */
import { ensureInstalled } from './scripts/install.mjs'
import { tell } from './scripts/root.mjs'
import { runSteps, TYPE_STEPS } from './scripts/steps.mjs'

try {
  await ensureInstalled()
  const failed = await runSteps(TYPE_STEPS)
  process.exitCode = failed === 0 ? 0 : 1
} catch (error) {
  tell(error instanceof Error ? error.message : String(error))
  process.exitCode = 1
}
