import { afterEach, describe, expect, it } from 'vitest'
import { defaultPlan, examplePlan, setField } from '../../../../core/plan'
import FormationRuler from '../../../../renderer/parts/ruler/FormationRuler.vue'
import type { Workspace } from '../../../../renderer/model/workspace'
import { computed, makeWorkspace, mountIn } from '../mountWithWorkspace'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

async function ruler(workspace: Workspace = makeWorkspace()) {
  await computed(workspace)
  const wrapper = mountIn(workspace, FormationRuler)
  mounted.push(wrapper)
  const ratio = () =>
    workspace.document.content.value.programme.stroke / workspace.document.content.value.nozzle.diameter
  return { wrapper, workspace, handle: wrapper.get('[role=slider]'), ratio }
}

describe('FormationRuler', () => {
  it('tells the stroke to a screen reader in words', async () => {
    const { handle } = await ruler()
    expect(handle.attributes('aria-valuetext')).toBe('stroke ratio 2.50, stroke 62.5\u00A0mm')
    expect(handle.attributes('aria-valuenow')).toBe('2.5')
    expect(handle.attributes('tabindex')).toBe('0')
  })

  it('moves the stroke by the arrow keys, in one step of undo while they follow quickly', async () => {
    const { handle, ratio, workspace } = await ruler()
    await handle.trigger('keydown', { key: 'ArrowRight' })
    await handle.trigger('keydown', { key: 'ArrowUp' })
    await handle.trigger('keydown', { key: 'ArrowRight', shiftKey: true })
    await handle.trigger('keydown', { key: 'ArrowLeft' })
    expect(ratio()).toBeCloseTo(2.5 + 0.05 + 0.05 + 0.5 - 0.05, 10)
    expect(workspace.document.undoName.value).toBe('stroke')
    workspace.document.undo()
    expect(ratio()).toBeCloseTo(2.5, 10)
  })

  it('leaves keys with Alt, Ctrl and Cmd to those they belong to', async () => {
    const { handle, ratio } = await ruler()
    for (const more of [{ altKey: true }, { ctrlKey: true }, { metaKey: true }])
      await handle.trigger('keydown', { key: 'ArrowLeft', ...more })
    expect(ratio()).toBeCloseTo(2.5, 12)
  })

  it('keeps the stroke positive and on the scale', async () => {
    const { handle, ratio } = await ruler()
    await handle.trigger('keydown', { key: 'Home' })
    expect(ratio()).toBeCloseTo(0.05, 10)
    await handle.trigger('keydown', { key: 'ArrowLeft' })
    expect(ratio()).toBeCloseTo(0.05, 10)
    await handle.trigger('keydown', { key: 'End' })
    expect(ratio()).toBeCloseTo(10, 10)
  })

  it('keeps numbers far outside any use short, in figure, words and ticks', async () => {
    const far = setField(setField(defaultPlan(), 'nozzle.diameter', 1e-4), 'programme.stroke', 1000)
    const { wrapper, handle } = await ruler(makeWorkspace(far))
    expect(wrapper.get<HTMLInputElement>('.readout input').element.value).toBe('1×10⁷')
    expect(handle.attributes('aria-valuetext')).toBe('stroke ratio 1×10⁷, stroke 1×10⁶\u00A0mm')
    const ticks = wrapper.findAll('.tick text').map((text) => text.text())
    expect(ticks).toContain('1×10⁷')
    for (const text of ticks) expect(text.length).toBeLessThanOrEqual(8)
    const short = setField(setField(defaultPlan(), 'nozzle.diameter', 10), 'programme.stroke', 1e-9)
    const other = await ruler(makeWorkspace(short))
    expect(other.wrapper.get<HTMLInputElement>('.readout input').element.value).toBe('1×10⁻¹⁰')
  })

  it('takes a ratio with the D it counts', async () => {
    const { wrapper, ratio } = await ruler()
    const input = wrapper.get('.readout input')
    await input.setValue('3.2 D')
    await input.trigger('keydown', { key: 'Enter' })
    expect(ratio()).toBeCloseTo(3.2, 12)
    await input.setValue('3.2 d')
    await input.trigger('keydown', { key: 'Enter' })
    expect(ratio()).toBeCloseTo(3.2, 12)
    expect(wrapper.get('.readout .refusal').text()).toBe('Stroke ratio in exit diameters has a capital D: 3.2 D.')
  })

  it('takes a typed ratio and refuses one that is no stroke', async () => {
    const { wrapper, ratio } = await ruler()
    const input = wrapper.get('.readout input')
    await input.setValue('3.2')
    await input.trigger('keydown', { key: 'Enter' })
    expect(ratio()).toBeCloseTo(3.2, 12)
    await input.setValue('0')
    await input.trigger('keydown', { key: 'Enter' })
    expect(ratio()).toBeCloseTo(3.2, 12)
    expect(wrapper.get('.refusal').text()).toContain('must be above 0')
  })

  it('shows the band and a labelled tick for each estimate core gives', async () => {
    const { wrapper, workspace } = await ruler(makeWorkspace(examplePlan('inspection-thruster')))
    const numbers = workspace.results.finished.value?.data.pulse?.formationNumber
    expect(numbers).toBeDefined()
    const texts = wrapper.findAll('.estimate text').map((text) => text.text())
    for (const [key, name] of [
      ['energyLimit', 'energy limit'],
      ['carriedVolume', 'carried volume'],
      ['speedMatch', 'speed match'],
    ] as const) {
      const value = numbers?.[key] ?? null
      if (value !== null) expect(texts).toContain(`${name} ${value.toFixed(2)}`)
    }
    expect(wrapper.findAll('.estimate').length).toBeGreaterThan(0)
    expect(wrapper.find('rect.band').exists()).toBe(true)
  })

  it('says so where no estimate exists, as in a strong counter-flow', async () => {
    const counterFlow = setField(defaultPlan(), 'ambient.axialFlow', -0.06)
    const { wrapper, workspace } = await ruler(makeWorkspace(counterFlow))
    expect(workspace.results.finished.value?.data.pulse?.formationNumber.published).toBeNull()
    expect(wrapper.findAll('.estimate')).toHaveLength(0)
    expect(wrapper.get('text.absence').text()).toBe('no pinch-off expected: see the cautions')
  })
})
