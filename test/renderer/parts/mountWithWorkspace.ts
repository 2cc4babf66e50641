/**
 * Mounts a component inside a workspace whose worker is core/run itself, called in the same thread.
 */
import { mount } from '@vue/test-utils'
import { effectScope, type Component } from 'vue'
import { defaultPlan, type Plan } from '../../../core/plan'
import { createJetCache, run, thrusterMap, wakePicture } from '../../../core/run'
import type { ChosenFile, Host, HostFailure, OpenedPlanFile, PlanFile } from '../../../renderer/host/types'
import { createTheme } from '../../../renderer/model/theme'
import { createWorkspace, WORKSPACE_KEY, type Workspace } from '../../../renderer/model/workspace'
import { createFieldSteps } from '../../../renderer/worker/fieldSteps'
import type { WorkerClient } from '../../../renderer/worker/client'

export interface FakeHost extends Host {
  opened: OpenedPlanFile | HostFailure | null
  table: { readonly name: string; readonly text: string } | HostFailure | null
  saved: PlanFile | HostFailure | null
  chosen: readonly ChosenFile[]
  readonly writes: { readonly file: PlanFile | null; readonly name: string; readonly text: string }[]
  readonly exports: { readonly kind: string; readonly name: string; readonly content: string | Uint8Array }[]
}

/** A host that answers what the test lays into it. */
export function fakeHost(): FakeHost {
  const host: FakeHost = {
    kind: 'browser',
    opened: null,
    table: null,
    saved: { token: 'file-1', name: 'saved.ringwright.json' },
    chosen: [],
    writes: [],
    exports: [],
    openPlan: async () => host.opened,
    openDropped: async (file) => ({ token: null, name: file.name, text: await file.text() }),
    openTable: async () => host.table,
    chooseTables: async () => host.chosen,
    async savePlan(file, name, text) {
      host.writes.push({ file, name, text })
      return host.saved
    },
    async exportFile(kind, name, content) {
      host.exports.push({ kind, name, content })
      return { name }
    },
    showDocument: () => undefined,
    setTheme: () => undefined,
    onCommand: () => () => undefined,
    givenPlan: async () => null,
    onGiven: () => () => undefined,
  }
  return host
}

/** As the worker does it, with finished jets kept; nothing can be cancelled. */
function directClient(): WorkerClient {
  const jetCache = createJetCache()
  const fieldSteps = createFieldSteps()
  return {
    run: (plan, sections, _onProgress, jet = 'run', fields = null) => ({
      outcome: run(plan, { sections, jet, sizing: jet === 'cached' ? 'off' : 'run', fields }, { jetCache }).then(
        (result) => ({
          kind: 'result',
          result,
        }),
      ),
      cancel: () => undefined,
    }),
    picture: (plan, data, request) => ({
      outcome: wakePicture(plan, data, request).then((picture) => ({ kind: 'picture', picture })),
      cancel: () => undefined,
    }),
    map: (plan, request) => ({
      outcome: Promise.resolve({ kind: 'map', map: thrusterMap(plan, request, jetCache) }),
      cancel: () => undefined,
    }),
    fields: (step) => ({
      outcome: fieldSteps(step).then((answer) => ({ kind: 'fields', answer })),
      cancel: () => undefined,
    }),
    dispose: () => undefined,
  }
}

export function makeWorkspace(plan: Plan = defaultPlan(), host: FakeHost = fakeHost()): Workspace {
  const workspace = effectScope(true).run(() =>
    createWorkspace({
      host,
      client: directClient(),
      plan,
      storage: null,
      theme: createTheme({ storage: null, root: { dataset: {} }, dark: null }),
      now: () => 0,
    }),
  )
  if (workspace === undefined) throw new Error('the scope was stopped')
  return workspace
}

/** Waits until the results shown are those of the open plan. */
export async function computed(workspace: Workspace): Promise<void> {
  for (let i = 0; i < 200 && workspace.results.status.value !== 'current'; i++)
    await new Promise((resolve) => setTimeout(resolve, 5))
}

export function mountIn(workspace: Workspace, component: Component, props: Record<string, unknown> = {}) {
  return mount(component, { props, attachTo: document.body, global: { provide: { [WORKSPACE_KEY]: workspace } } })
}
