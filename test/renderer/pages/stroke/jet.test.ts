/** Forming the jet on the Stroke page: run, numbers, moments, the handle on the ruler, results, inputs. */
import { flushPromises } from '@vue/test-utils'
import { nextTick } from 'vue'
import { afterEach, describe, expect, it } from 'vitest'
import { defaultPlan, setField, setJet, type Plan } from '../../../../core/plan'
import type { Workspace } from '../../../../renderer/model/workspace'
import JetInputs from '../../../../renderer/pages/stroke/JetInputs.vue'
import StrokePicture from '../../../../renderer/pages/stroke/StrokePicture.vue'
import StrokeResults from '../../../../renderer/pages/stroke/StrokeResults.vue'
import FormationRuler from '../../../../renderer/parts/ruler/FormationRuler.vue'
import { computed, makeWorkspace, mountIn } from '../../parts/mountWithWorkspace'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

/** One coarse smoothing length: a few tenths of a second with the longer stroke that tells the formation number. */
function plan(strokeRatio = 2): Plan {
  const coarse = setJet(defaultPlan(), { ensemble: false, delta: 0.2 })
  return setField(coarse, 'programme.stroke', strokeRatio * coarse.nozzle.diameter)
}

async function formed(workspace: Workspace): Promise<void> {
  for (let i = 0; i < 2000 && workspace.jet.status.value !== 'current'; i++)
    await new Promise((resolve) => setTimeout(resolve, 5))
  expect(workspace.jet.status.value).toBe('current')
  await computed(workspace)
  await flushPromises()
}

async function picture(workspace = makeWorkspace(plan())) {
  await computed(workspace)
  const wrapper = mountIn(workspace, StrokePicture)
  mounted.push(wrapper)
  const button = (text: string) => wrapper.findAll('button').find((candidate) => candidate.text() === text)
  return { wrapper, workspace, button }
}

describe('Form it', () => {
  it('offers the run, runs it by the command of the page and shows picture, numbers and plots', async () => {
    const { wrapper, workspace, button } = await picture()
    await button('Form it')?.trigger('click')
    expect(wrapper.get('.jet-start').text()).toContain('Form the jet')
    expect(wrapper.get('.jet-run').text()).toContain('Not run yet.')
    workspace.perform('run.refresh')
    await formed(workspace)
    expect(wrapper.get('.jet-run').text()).toContain('For this plan.')
    expect(wrapper.findAll('.jet-figures dt').map((label) => label.text())).toContain('In the ring')
    expect(wrapper.findAll('.plot-title').map((title) => title.text())).toEqual([
      'Circulation shed',
      'Impulse shed',
      'Dimensionless energy',
    ])
    await button('Ring')?.trigger('click')
    expect(wrapper.find('.jet-time').exists()).toBe(false)
  })

  it('adds the section to a plan without one, as a step of undo', async () => {
    const workspace = makeWorkspace({ ...plan(), jet: null })
    const { button } = await picture(workspace)
    await button('Form it')?.trigger('click')
    workspace.perform('run.refresh')
    expect(workspace.document.content.value.jet).not.toBeNull()
    expect(workspace.document.undoName.value).toBe('starting jet')
    workspace.jet.cancel()
  })

  it('does not run the jet while the ring is shown', async () => {
    const { workspace } = await picture()
    workspace.perform('run.refresh')
    await computed(workspace)
    expect(workspace.jet.status.value).toBe('none')
  })

  it('jumps to a moment, steps by keys, and tells where it is in words', async () => {
    const { wrapper, workspace, button } = await picture()
    await button('Form it')?.trigger('click')
    workspace.perform('run.refresh')
    await formed(workspace)
    const slider = wrapper.get('.playback input[type=range]')
    await slider.trigger('keydown', { key: 'Home' })
    expect(workspace.jetView.playback.index.value).toBe(0)
    await slider.trigger('keydown', { key: 'ArrowRight' })
    expect(workspace.jetView.playback.index.value).toBe(1)
    await wrapper.get('.moments button').trigger('click')
    expect(workspace.jetView.place.value ?? 0).toBeGreaterThanOrEqual(2 - 1e-9)
    expect(slider.attributes('aria-valuetext')).toMatch(/^formation time 2\.00, /)
  })

  it('marks what is shown as stale when the plan changes, and takes a refusal to its field', async () => {
    const { wrapper, workspace, button } = await picture()
    await button('Form it')?.trigger('click')
    workspace.perform('run.refresh')
    await formed(workspace)
    workspace.document.change('stroke', setField(workspace.document.content.value, 'programme.stroke', 0.07))
    await nextTick()
    expect(wrapper.get('.jet-run').text()).toContain('For the previous plan.')
    expect(wrapper.find('.jet-figures').exists()).toBe(true)
  })
})

describe('the time of the jet on the ruler', () => {
  it('is a slider of its own that follows the playback and moves it', async () => {
    const workspace = makeWorkspace(plan())
    workspace.jetView.showing.value = true
    workspace.perform('run.refresh')
    await formed(workspace)
    const wrapper = mountIn(workspace, FormationRuler)
    mounted.push(wrapper)
    const handle = wrapper.get('.playhead')
    expect(handle.attributes('role')).toBe('slider')
    await handle.trigger('keydown', { key: 'Home' })
    expect(workspace.jetView.playback.index.value).toBe(0)
    const first = Number(handle.attributes('aria-valuenow'))
    await handle.trigger('keydown', { key: 'PageUp' })
    expect(workspace.jetView.playback.index.value).toBe(10)
    expect(Number(handle.attributes('aria-valuenow'))).toBeGreaterThan(first)
    const stroke = workspace.document.content.value.programme.stroke
    await handle.trigger('keydown', { key: 'End' })
    expect(handle.attributes('aria-valuetext')).toMatch(/: stopped$/)
    expect(workspace.document.content.value.programme.stroke).toBe(stroke)
    workspace.jetView.showing.value = false
    await nextTick()
    expect(wrapper.find('.playhead').exists()).toBe(false)
  })

  it('has the computed number as a tick with one decimal', async () => {
    const workspace = makeWorkspace(plan(8))
    workspace.jetView.showing.value = true
    workspace.perform('run.refresh')
    await formed(workspace)
    const wrapper = mountIn(workspace, FormationRuler)
    mounted.push(wrapper)
    const number = workspace.jet.finished.value?.jet.formation?.formationNumber ?? NaN
    expect(wrapper.findAll('.estimate text').map((text) => text.text())).toContain(`computed ${number.toFixed(1)}`)
  })
})

describe('the results of the jet', () => {
  it('stand first while it is shown, answer why, and mark a jet of another plan', async () => {
    const workspace = makeWorkspace(plan(8))
    workspace.jetView.showing.value = true
    workspace.perform('run.refresh')
    await formed(workspace)
    const wrapper = mountIn(workspace, StrokeResults)
    mounted.push(wrapper)
    expect(wrapper.get('.heading').text()).toBe('The jet as computed')
    await wrapper.get('.jet-results .why').trigger('click')
    await flushPromises()
    const panel = wrapper.get('.jet-results [role=dialog]')
    expect(panel.get('h2').text()).toBe('Formation number, computed')
    expect(panel.find('math').exists()).toBe(true)
    workspace.document.change('diameter', setField(workspace.document.content.value, 'nozzle.diameter', 0.02))
    await nextTick()
    expect(wrapper.get('.jet-results').text()).toContain('For the plan as it was')
  })
})

describe('the inputs of the jet', () => {
  it('put it into the plan and take it out, and set how it is computed', async () => {
    const workspace = makeWorkspace({ ...plan(), jet: null })
    const wrapper = mountIn(workspace, JetInputs)
    mounted.push(wrapper)
    expect(wrapper.findAll('input')).toHaveLength(1)
    await wrapper.get('input').setValue(true)
    const jet = () => workspace.document.content.value.jet
    expect(jet()).toEqual({ ensemble: true, coreGrowth: true, delta: null })
    const [own, ensemble, growth] = wrapper.findAll('input[type=checkbox]')
    await ensemble?.setValue(false)
    await growth?.setValue(false)
    const delta = wrapper.get('[data-path="jet.delta"] input')
    await delta.setValue('0.08')
    await delta.trigger('keydown', { key: 'Enter' })
    expect(jet()).toEqual({ ensemble: false, coreGrowth: false, delta: 0.08 })
    await own?.setValue(false)
    expect(jet()).toBeNull()
  })
})
