import { flushPromises } from '@vue/test-utils'
import { nextTick } from 'vue'
import { afterEach, describe, expect, it } from 'vitest'
import { examplePlan, setChoice, setField } from '../../../../core/plan'
import { formatRange } from '../../../../core/quantity'
import StrokeInputs from '../../../../renderer/pages/stroke/StrokeInputs.vue'
import StrokeResults from '../../../../renderer/pages/stroke/StrokeResults.vue'
import { computed, fakeHost, makeWorkspace, mountIn } from '../../parts/mountWithWorkspace'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

describe('StrokeInputs', () => {
  function inputs(workspace = makeWorkspace(examplePlan('inspection-thruster'))) {
    const wrapper = mountIn(workspace, StrokeInputs)
    mounted.push(wrapper)
    const named = (label: string) => {
      const found = wrapper.findAll('label').find((candidate) => candidate.text() === label)
      return found === undefined ? null : document.getElementById(found.attributes('for') ?? '')
    }
    return { wrapper, workspace, named }
  }

  it('shows every field in its unit', () => {
    const { named } = inputs()
    const value = (label: string) => {
      const field = named(label)
      return field instanceof HTMLInputElement ? field.value.replace('\u00A0', ' ') : null
    }
    expect(value('Exit diameter')).toBe('30 mm')
    expect(value('Peak exit speed')).toBe('0.2 m/s')
    expect(value('Rise time')).toBe('40 ms')
    expect(value('Depth')).toBe('5 m')
    expect(value('Temperature')).toBe('15 °C')
  })

  it('changes the plan from a field, as a named step', async () => {
    const { wrapper, workspace } = inputs()
    const field = wrapper.get('[data-path="nozzle.diameter"] input')
    await field.setValue('1.5 in')
    await field.trigger('keydown', { key: 'Enter' })
    expect(workspace.document.content.value.nozzle.diameter).toBe(0.0381)
    expect(workspace.document.undoName.value).toBe('exit diameter')
  })

  it('shows the contraction for an orifice, and the radial ratio for every exit that is no tube', async () => {
    const { wrapper, workspace } = inputs()
    const has = (path: string) => wrapper.find(`[data-path="${path}"]`).exists()
    expect([has('nozzle.contraction'), has('nozzle.radialRatio')]).toEqual([false, false])
    await wrapper.findAll('select')[0]?.setValue('orifice')
    expect([has('nozzle.contraction'), has('nozzle.radialRatio')]).toEqual([true, true])
    expect(workspace.document.content.value.nozzle.shape).toBe('orifice')
    await wrapper.findAll('select')[0]?.setValue('converging')
    expect([has('nozzle.contraction'), has('nozzle.radialRatio')]).toEqual([false, true])
  })

  it('asks for what a given liquid needs and says so at the field', async () => {
    const { wrapper, workspace } = inputs()
    const given = setChoice(workspace.document.content.value, 'water.kind', 'given')
    workspace.document.change('kind', setField(given, 'water.density', null))
    await nextTick()
    expect(wrapper.get('[data-path="water.density"] .refusal').text()).not.toBe('')
    expect(wrapper.find('[data-path="water.temperatureCelsius"]').exists()).toBe(false)
  })

  it('chooses a programme by its drawing and hides the ramps where there are none', async () => {
    const { wrapper, workspace } = inputs()
    const radios = wrapper.findAll('input[type=radio]')
    expect(radios).toHaveLength(6)
    await wrapper.get('input[type=radio][value=half-sine]').trigger('change')
    expect(workspace.document.content.value.programme.shape).toBe('half-sine')
    expect(wrapper.find('[data-path="programme.riseTime"]').exists()).toBe(false)
  })

  it('reads a table and sums it up', async () => {
    const host = fakeHost()
    host.table = { name: 'run.csv', text: 'time (s),speed (m/s)\n0,0\n0.5,0.2\n1,0\n' }
    const { wrapper, workspace } = inputs(makeWorkspace(undefined, host))
    await wrapper.get('input[type=radio][value=table]').trigger('change')
    expect(wrapper.get('.table-source').text()).toContain('No table read yet')
    await wrapper.get('.table-source button').trigger('click')
    await flushPromises()
    expect(wrapper.get('.table-source').text().replaceAll('\u00A0', ' ')).toContain(
      '3 rows of time and speed, 0 s to 1 s',
    )
    expect(workspace.document.content.value.programme.rows).toHaveLength(3)
  })
})

describe('StrokeResults', () => {
  async function resultsOf(workspace = makeWorkspace(examplePlan('inspection-thruster'))) {
    await computed(workspace)
    const wrapper = mountIn(workspace, StrokeResults)
    mounted.push(wrapper)
    return { wrapper, workspace }
  }

  it('shows core’s own ring as a range', async () => {
    const { wrapper, workspace } = await resultsOf()
    const pulse = workspace.results.finished.value?.data.pulse
    const speeds = [pulse?.ringFromSlug?.speed ?? 0, pulse?.ringWithOverPressure?.speed ?? 0]
    const expected = formatRange(Math.min(...speeds), Math.max(...speeds), 'mm/s').text
    const figures = wrapper.findAll('.result').map((row) => row.get('.number').text())
    expect(figures).toContain(expected)
  })

  it('answers why with formula, values, source and verdict', async () => {
    const { wrapper } = await resultsOf()
    await wrapper.get('.result .why').trigger('click')
    await flushPromises()
    const panel = wrapper.get('[role=dialog]')
    expect(panel.get('h2').text()).toBe('Circulation of the ring')
    expect(panel.find('math').exists()).toBe(true)
    expect(panel.findAll('tbody tr').length).toBeGreaterThan(2)
    expect(panel.text()).toContain('Source')
    expect(panel.get('.verdict').text()).toMatch(/inside|outside/iu)
  })

  it('keeps old results and says why there are no newer ones', async () => {
    const { wrapper, workspace } = await resultsOf()
    const before = wrapper.findAll('.result').length
    const given = setChoice(workspace.document.content.value, 'water.kind', 'given')
    workspace.document.change('kind', setField(given, 'water.density', null))
    await nextTick()
    expect(wrapper.get('[role=alert]').text()).toContain('Density must be given')
    expect(wrapper.get('[role=alert]').text()).toContain('before this change')
    expect(wrapper.findAll('.result')).toHaveLength(before)
  })
})
