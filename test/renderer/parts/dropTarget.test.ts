import { flushPromises } from '@vue/test-utils'
import { afterEach, describe, expect, it } from 'vitest'
import { nextTick } from 'vue'
import { examplePlan } from '../../../core/plan'
import type { PageId } from '../../../renderer/model/pages'
import DropTarget from '../../../renderer/parts/DropTarget.vue'
import { fakeHost, makeWorkspace, mountIn } from './mountWithWorkspace'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

const RINGS = 'circulation (cm²/s),radius (mm),core radius (mm),x (mm)\n100,20,2,0\n100,20,2,40\n'

function target(page: PageId, example = 'bench-generator') {
  const workspace = makeWorkspace(examplePlan(example), fakeHost())
  workspace.page.value = page
  const wrapper = mountIn(workspace, DropTarget)
  mounted.push(wrapper)
  const send = async (type: 'dragover' | 'drop', file: File) => {
    const transfer = { types: ['Files'], files: [file] }
    const event = Object.assign(new Event(type, { cancelable: true }), { dataTransfer: transfer })
    window.dispatchEvent(event)
    await flushPromises()
    await nextTick()
  }
  return { wrapper, workspace, send }
}

describe('a table dropped on the window', () => {
  it('is offered as rings on the Wake page, which says so before and after', async () => {
    const { wrapper, workspace, send } = target('wake', 'leapfrogging-pair')
    const file = new File([RINGS], 'rings.csv')
    await send('dragover', file)
    expect(wrapper.text()).toBe('Drop a plan to open it, or a table (CSV) to read it into the ring list')
    const before = workspace.document.content.value
    await send('drop', file)
    const { offered } = workspace.ringOffer
    expect(offered.value).toMatchObject({ from: 'rings.csv', reading: { ok: true, skipped: [] } })
    expect(workspace.document.content.value).toBe(before)
    const reading = offered.value?.reading
    workspace.ringOffer.take('add', reading?.ok === true ? reading.rings : [])
    expect(workspace.document.content.value.wake?.rings).toHaveLength(4)
    expect(workspace.document.undoName.value).toBe('rings read')
    expect(workspace.notices.list.value.at(-1)?.text).toBe('Read 2 rings from rings.csv into the ring list.')
  })

  it('begins a wake where the plan has none, with a time that shows what the rings do', async () => {
    const { workspace, send } = target('wake')
    await send('drop', new File([RINGS], 'rings.csv'))
    const reading = workspace.ringOffer.offered.value?.reading
    workspace.ringOffer.take('replace', reading?.ok === true ? reading.rings : [])
    const { wake } = workspace.document.content.value
    expect(wake?.rings).toHaveLength(2)
    // 30 radii of way at Gamma / (4 R) = 0.125 m/s take 4.8 s; the round number below is 2.
    expect(wake?.duration).toBe(2)
  })

  it('is the speed programme on the other pages, and a plan is a plan on any', async () => {
    const { wrapper, workspace, send } = target('stroke')
    const file = new File(['time (s),speed (m/s)\n0,0\n0.5,0.2\n1,0\n'], 'run.csv')
    await send('dragover', file)
    expect(wrapper.text()).toMatch(/speed programme$/)
    await send('drop', file)
    expect(workspace.ringOffer.offered.value).toBeNull()
    expect(workspace.document.content.value.programme.shape).toBe('table')
    const other = target('wake')
    await other.send('drop', new File(['{"format":"something"}'], 'plan.json'))
    expect(other.workspace.ringOffer.offered.value).toBeNull()
    expect(other.workspace.notices.list.value.at(-1)?.text).toMatch(/^plan\.json was not opened/)
  })
})
