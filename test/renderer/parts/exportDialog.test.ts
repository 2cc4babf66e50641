import { afterEach, describe, expect, it } from 'vitest'
import { flushPromises } from '@vue/test-utils'
import { examplePlan, setField, setJet } from '../../../core/plan'
import ExportDialog from '../../../renderer/parts/dialogs/ExportDialog.vue'
import { computed, makeWorkspace, mountIn } from './mountWithWorkspace'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

describe('the export dialog', () => {
  it('calls results of another page current after a jet is added, and names those that a change made old', async () => {
    const workspace = makeWorkspace(examplePlan('survey-vehicle'))
    workspace.page.value = 'thrust'
    await computed(workspace)
    for (let i = 0; i < 400 && workspace.thrust.quick.status.value !== 'current'; i++)
      await new Promise((resolve) => setTimeout(resolve, 5))
    workspace.page.value = 'stroke'
    const { document } = workspace
    document.change('starting jet', setJet(document.content.value, {}))
    await computed(workspace)
    const wrapper = mountIn(workspace, ExportDialog)
    mounted.push(wrapper)
    await flushPromises()
    expect(wrapper.findAll('.exports li').length).toBeGreaterThan(5)
    expect(wrapper.find('.warn').exists()).toBe(false)

    document.change('stroke', setField(document.content.value, 'programme.stroke', 0.1))
    await computed(workspace)
    await flushPromises()
    expect(wrapper.get('.warn').text()).toBe('Results of the thruster are for the plan before its last change.')
  })
})
