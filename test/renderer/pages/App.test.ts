import { flushPromises, mount } from '@vue/test-utils'
import { nextTick } from 'vue'
import { afterEach, describe, expect, it } from 'vitest'
import { examplePlan, setStrokeRatio } from '../../../core/plan'
import App from '../../../renderer/App.vue'
import { computed, fakeHost, makeWorkspace } from '../parts/mountWithWorkspace'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
  window.location.hash = ''
})

async function open() {
  const host = fakeHost()
  const workspace = makeWorkspace(examplePlan('bench-generator'), host)
  await computed(workspace)
  // The drawing needs a graphics card and the plots a canvas: both have tests of their own in a real browser.
  const wrapper = mount(App, {
    props: { workspace },
    attachTo: document.body,
    global: { stubs: { PulseScene: true, PlotCard: true } },
  })
  mounted.push(wrapper)
  const press = (key: string, more: KeyboardEventInit = {}) =>
    (document.activeElement ?? document.body).dispatchEvent(
      new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true, ...more }),
    )
  return { wrapper, workspace, host, press }
}

/** Pages and dialogs are loaded when they are first shown. */
const LOADING = { timeout: 20_000 }

describe('App', () => {
  it('names the five pages, marks the open one, and keeps the ruler on each', async () => {
    const { wrapper, workspace } = await open()
    expect(wrapper.findAll('nav a').map((link) => link.text())).toEqual([
      'Stroke',
      'Thrust',
      'Wake',
      'Tank run',
      'Readings',
    ])
    for (const id of ['thrust', 'wake', 'tankRun', 'readings'] as const) {
      workspace.page.value = id
      await nextTick()
      expect(wrapper.get('nav a[aria-current=page]').attributes('href')).toBe(`#${id}`)
      expect(wrapper.find('[role=slider]').exists()).toBe(true)
      await expect.poll(() => wrapper.find('main').exists(), LOADING).toBe(true)
      expect(wrapper.get('main').text().length).toBeGreaterThan(100)
    }
  })

  it('shows water, Reynolds number, freshness and cautions as the working status', async () => {
    const { wrapper, workspace } = await open()
    const pulse = workspace.results.finished.value?.data.pulse
    const status = wrapper.get('.status').text().replaceAll('\u00A0', ' ')
    expect(status).toContain('fresh water 20 °C')
    expect(status).toContain(`jet Reynolds number ${Number(pulse?.jetReynolds.toPrecision(3))}`)
    expect(status).toContain('results current')
  })

  it('says while refused entries stand in their fields that results are for the plan without them', async () => {
    const { wrapper, workspace } = await open()
    const status = () => wrapper.get('.status').text()
    const diameter = wrapper.get<HTMLInputElement>('[data-path="nozzle.diameter"] input')
    const stroke = wrapper.get<HTMLInputElement>('[data-path="programme.stroke"] input')
    for (const field of [diameter, stroke]) {
      await field.setValue('12 mL')
      await field.trigger('keydown', { key: 'Enter' })
    }
    await expect.poll(status).toContain('results for the accepted plan, 2 entries not taken')
    expect(status()).not.toContain('results current')
    await stroke.trigger('keydown', { key: 'Escape' })
    await expect.poll(status).toContain('results for the accepted plan, 1 entry not taken')
    // A field that leaves the screen takes what was typed with it.
    workspace.page.value = 'wake'
    await expect.poll(status).toContain('results current')
  })

  it('undoes, redoes and saves by keys', async () => {
    const { workspace, host, press } = await open()
    workspace.document.change('stroke', setStrokeRatio(workspace.document.content.value, 3))
    press('z', { ctrlKey: true })
    expect(workspace.document.undoName.value).toBeNull()
    press('z', { ctrlKey: true, shiftKey: true })
    expect(workspace.document.undoName.value).toBe('stroke')
    press('s', { ctrlKey: true })
    await flushPromises()
    expect(host.writes).toHaveLength(1)
    expect(workspace.document.edited.value).toBe(false)
  })

  it('takes what is being typed into a save, and leaves undo to the text while it is typed', async () => {
    const { wrapper, workspace, host, press } = await open()
    workspace.document.change('stroke', setStrokeRatio(workspace.document.content.value, 3))
    const field = wrapper.get<HTMLInputElement>('[data-path="nozzle.diameter"] input')
    field.element.focus()
    await field.setValue('26')
    press('z', { ctrlKey: true })
    expect(workspace.document.undoName.value).toBe('stroke')
    press('s', { ctrlKey: true })
    await flushPromises()
    expect(workspace.document.content.value.nozzle.diameter).toBe(0.026)
    expect(host.writes[0]?.text).toContain('"diameter": 0.026')
  })

  it('leaves keys alone that no command has', async () => {
    const { press } = await open()
    const event = new KeyboardEvent('keydown', { key: 'n', ctrlKey: true, bubbles: true, cancelable: true })
    document.body.dispatchEvent(event)
    expect(event.defaultPrevented).toBe(false)
    expect(press('F5')).toBe(true)
  })

  it('renames the plan in place as one step', async () => {
    const { wrapper, workspace } = await open()
    await wrapper.get('button.title').trigger('click')
    const input = wrapper.get('input.title')
    await input.setValue('Float')
    await input.trigger('keydown', { key: 'Enter' })
    await nextTick()
    expect(workspace.document.content.value.title).toBe('Float')
    expect(workspace.document.undoName.value).toBe('title')
    expect(wrapper.get('button.title').text()).toBe('Float')
  })

  it('opens an example from its dialog', async () => {
    const { wrapper, workspace } = await open()
    workspace.perform('file.examples')
    await nextTick()
    const buttons = wrapper.findAll('dialog .examples button')
    expect(buttons.length).toBeGreaterThanOrEqual(5)
    await buttons[1]?.trigger('click')
    await flushPromises()
    expect(workspace.document.content.value.title).toBe('Inspection vehicle, aft thruster')
  })

  it('exports pulse.csv as core writes it', async () => {
    const { wrapper, workspace, host } = await open()
    workspace.perform('file.export')
    await expect.poll(() => wrapper.find('dialog').exists(), LOADING).toBe(true)
    await wrapper.get('dialog button[aria-label="Pulse over time as CSV"]').trigger('click')
    await flushPromises()
    expect(host.exports[0]?.name).toBe('bench-ring-generator-pulse.csv')
    const text = String(host.exports[0]?.content)
    expect(text.startsWith('time (s),exit speed (m/s),formation time,')).toBe(true)
    expect(text.split('\r\n').length).toBeGreaterThan(201)
    expect(wrapper.get('.outcome').text()).toBe('Exported bench-ring-generator-pulse.csv.')
  })

  it('saves chosen units with the plan without a step of undo', async () => {
    const { wrapper, workspace } = await open()
    workspace.perform('view.units')
    await expect.poll(() => wrapper.find('dialog').exists(), LOADING).toBe(true)
    const select = wrapper.findAll('dialog .field').find((field) => field.text().startsWith('Ring speed'))
    await select?.get('select').setValue('cm/s')
    expect(workspace.document.plan.value.view.units['ringSpeed']).toBe('cm/s')
    expect(workspace.document.undoName.value).toBeNull()
    expect(wrapper.get('.column.results').text()).toContain('cm/s')
  })
})
