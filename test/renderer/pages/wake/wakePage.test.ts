import { flushPromises } from '@vue/test-utils'
import { nextTick } from 'vue'
import { afterEach, describe, expect, it } from 'vitest'
import { defaultPlan, examplePlan, setField, setWake } from '../../../../core/plan'
import WakePage from '../../../../renderer/pages/wake/WakePage.vue'
import ExportDialog from '../../../../renderer/parts/dialogs/ExportDialog.vue'
import { computed, fakeHost, makeWorkspace, mountIn } from '../../parts/mountWithWorkspace'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

const RING = {
  circulation: 0.01,
  radius: 0.02,
  coreRadius: 0.002,
  core: 'uniform',
  centre: [0, 0, 0],
  direction: [1, 0, 0],
} as const
const PAIR = setWake(defaultPlan(), {
  rings: [RING, { ...RING, centre: [0.02, 0, 0] }],
  duration: 1,
  viscous: false,
  stations: [0.05],
})

async function pageOf(plan = PAIR, host = fakeHost()) {
  const workspace = makeWorkspace(plan, host)
  workspace.page.value = 'wake'
  await computed(workspace)
  const wrapper = mountIn(workspace, WakePage)
  mounted.push(wrapper)
  // Drawn a frame after the results are there.
  for (let i = 0; i < 100 && plan.wake !== null && !wrapper.find('.events').exists(); i++)
    await new Promise((resolve) => setTimeout(resolve, 5))
  await flushPromises()
  const button = (name: string | RegExp) => {
    const found = wrapper
      .findAll('button')
      .find((each) => (typeof name === 'string' ? each.text() === name : name.test(each.text())))
    if (found === undefined) throw new Error(`no button ${name}`)
    return found
  }
  const time = () => wrapper.get('input[type=range]').attributes('aria-valuetext')?.replaceAll('\u00A0', ' ')
  return { wrapper, workspace, button, time }
}

describe('the Wake page', () => {
  it('offers both ways to begin where the plan follows no rings, each one undoable step', async () => {
    const { wrapper, workspace, button } = await pageOf(defaultPlan())
    await button('Follow the train').trigger('click')
    expect(workspace.document.content.value.train?.pulses).toBe(3)
    expect(workspace.document.undoName.value).toBe('wake')
    workspace.document.undo()
    await nextTick()
    expect(workspace.document.content.value.wake).toBeNull()
    await button('Place rings by hand').trigger('click')
    expect(workspace.document.content.value.wake?.rings).toHaveLength(2)
    expect(wrapper.find('.wake-run').exists()).toBe(true)
  })

  it('runs a short wake by itself and shows its events, answer and march', async () => {
    const { wrapper, workspace } = await pageOf()
    const wake = workspace.wake.finished.value?.wake.wake
    expect(wrapper.findAll('.events button')).toHaveLength(wake?.events.length ?? 0)
    expect(wrapper.text().replaceAll('\u00A0', ' ')).toMatch(/Ring 1 catches and passes ring 2 at [\d.]+ s/)
    expect(wrapper.get('.facts').text()).toContain('Rings on one axis')
  })

  it('takes the time to an event, and shows the picked ring’s numbers there', async () => {
    const { wrapper, button, time, workspace } = await pageOf()
    expect(time()).toBe('0.00 s of 1.00 s')
    await wrapper.get('select[aria-label="Picked ring"]').setValue('2')
    const before = wrapper.get('.figures').text()
    const first = workspace.wake.finished.value?.wake.wake.events[0]?.time ?? NaN
    await button(/pass/).trigger('click')
    expect(Math.abs(Number.parseFloat(time() ?? '') - first)).toBeLessThanOrEqual(0.026)
    expect(wrapper.get('.figures').text()).not.toBe(before)
  })

  it('steps and scrubs', async () => {
    const { wrapper, time } = await pageOf()
    await wrapper.get('button[aria-label="One output on"]').trigger('click')
    expect(time()).toBe('0.05 s of 1.00 s')
    await wrapper.get('input[type=range]').trigger('keydown', { key: 'End' })
    expect(time()).toBe('1.00 s of 1.00 s')
    expect(wrapper.get('button[aria-label="One output on"]').attributes('disabled')).toBeDefined()
  })

  it('puts a refusal of the march at the field it belongs to', async () => {
    const { wrapper, workspace } = await pageOf()
    const change = (next: typeof PAIR) => workspace.document.change('test', next)
    change(setField(workspace.document.content.value, 'wake.tube', 0.015))
    for (let i = 0; i < 100 && workspace.wake.failure.value === null; i++)
      await new Promise((resolve) => setTimeout(resolve, 5))
    await nextTick()
    expect(wrapper.get('.wake-run [role=alert]').text()).toMatch(/^Radius of ring 1 must be at most .* of the tube/)
    await wrapper
      .findAll('button')
      .find((each) => each.text() === 'Rings (2)')
      ?.trigger('click')
    expect(wrapper.get('[data-cell="0 2"]').attributes('aria-invalid')).toBe('true')
    expect(wrapper.text()).toContain('Results are for the previous plan.')
  })

  it('says that results are without the entries not taken, in fields and in the table of rings', async () => {
    const { wrapper, workspace, button } = await pageOf()
    const standing = () => wrapper.get('.run-line [role=status]').text()
    expect(standing()).toBe('Results are for this plan.')
    const tolerance = wrapper.get('[data-path="wake.tolerance"] input')
    await tolerance.setValue('tight')
    await tolerance.trigger('keydown', { key: 'Enter' })
    expect(standing()).toBe('Results are for the accepted plan, 1 entry not taken.')
    await button('Rings (2)').trigger('click')
    await wrapper.get('[data-cell="0 2"]').trigger('dblclick')
    await wrapper.get('[data-cell="0 2"] input').setValue('12 mL')
    await wrapper.get('[data-cell="0 2"] input').trigger('keydown', { key: 'Enter' })
    expect(standing()).toBe('Results are for the accepted plan, 2 entries not taken.')
    expect(workspace.untaken.count.value).toBe(2)
  })

  it('changes walls and stations as named steps', async () => {
    const { wrapper, workspace, button } = await pageOf()
    const wallChoice = wrapper.findAll('.field').find((field) => field.text().startsWith('Wall'))
    await wallChoice?.get('select').setValue('plane')
    expect(workspace.document.content.value.wake?.wall).not.toBeNull()
    expect(workspace.document.undoName.value).toBe('wall')
    await button('Add a station').trigger('click')
    expect(workspace.document.content.value.wake?.stations).toEqual([0.05, 0.1])
    const last = wrapper.findAll('.field').find((field) => field.text().startsWith('Station 2'))
    await last?.get('input').setValue('')
    await last?.get('input').trigger('keydown', { key: 'Enter' })
    expect(workspace.document.content.value.wake?.stations).toEqual([0.05])
    expect(workspace.document.undoName.value).toBe('station 2')
  })

  it('reads rings from a file after showing what it found', async () => {
    const host = fakeHost()
    host.table = { name: 'rings.csv', text: 'circulation (cm2/s),radius (mm),core radius (mm)\n80,15,2\n80,0,2\n' }
    const { wrapper, workspace, button } = await pageOf(PAIR, host)
    await button('Rings (2)').trigger('click')
    await button('Read a file…').trigger('click')
    await flushPromises()
    expect(wrapper.get('dialog').text()).toContain('1 ring read from rings.csv; 1 of 2 rows skipped:')
    expect(wrapper.get('dialog').text()).toContain('Line 3: radius must be above 0\u00A0mm, got 0\u00A0mm.')
    await button('Replace all rings').trigger('click')
    expect(workspace.document.content.value.wake?.rings.map(({ radius }) => radius)).toEqual([0.015])
    expect(workspace.document.undoName.value).toBe('rings read')
  })

  it('shows duty cycle and spacing of a train, and its nozzles', async () => {
    const { wrapper } = await pageOf(examplePlan('three-ring-train'))
    expect(wrapper.get('.column.inputs').text()).toMatch(/Duty cycle\s*45/)
    expect(wrapper.get('.column.inputs').text()).toContain('Ring spacing')
  })

  it('exports trajectories and events with the tables the runner writes', async () => {
    const host = fakeHost()
    const { workspace } = await pageOf(PAIR, host)
    const dialog = mountIn(workspace, ExportDialog)
    mounted.push(dialog)
    await dialog.get('button[aria-label="Trajectories as CSV"]').trigger('click')
    await dialog.get('button[aria-label="Events as CSV"]').trigger('click')
    await dialog.get('button[aria-label$="as VTP"]').trigger('click')
    await flushPromises()
    expect(host.exports.map(({ kind }) => kind)).toEqual(['csv', 'csv', 'vtp'])
    expect(host.exports[0]?.content).toMatch(/^time \(s\),ring,x \(m\)/)
    expect(host.exports[1]?.content).toMatch(/\r\n1,end,/)
  })
})
