/** Starts the window: host, worker, theme and the open plan, handed to the root component. */
import { createApp, effectScope } from 'vue'
import { defaultPlan } from '../core/plan'
import App from './App.vue'
import { createHost } from './host'
import { createTheme } from './model/theme'
import { createWorkspace } from './model/workspace'
import { loadAhead } from './parts/loadedLater'
import { createWorkerClient } from './worker/client'
import { spawnWorker } from './worker/spawn'
import './style/tokens.css'
import './style/base.css'
import './style/frame.css'
import './style/bars.css'
import './style/ruler.css'
import './style/fields.css'
import './style/results.css'
import './style/dialogs.css'
import './style/wake.css'
import './style/jet.css'
import './style/tank.css'

/** Storage the page may not have, for instance where the browser keeps nothing. */
function storage(): Storage | null {
  try {
    return window.localStorage
  } catch {
    return null
  }
}

const host = createHost(window)
// Everything of the window lives as long as the page.
const workspace = effectScope(true).run(() => {
  const kept = storage()
  const theme = createTheme(
    {
      storage: kept,
      root: document.documentElement,
      dark: window.matchMedia('(prefers-color-scheme: dark)'),
    },
    (choice) => host.setTheme(choice),
  )
  return createWorkspace({
    host,
    client: createWorkerClient(spawnWorker),
    wakeClient: createWorkerClient(spawnWorker),
    pictureClient: createWorkerClient(spawnWorker),
    theme,
    plan: defaultPlan(),
    storage: kept,
  })
})
if (workspace !== undefined) createApp(App, { workspace }).mount('#app')
window.requestIdleCallback(() => void loadAhead(), { timeout: 5000 })
