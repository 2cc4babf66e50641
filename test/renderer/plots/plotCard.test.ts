import { mount } from '@vue/test-utils'
import { nextTick, shallowRef } from 'vue'
import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import PlotCard from '../../../renderer/plots/PlotCard.vue'
import { cursorReadout, nearestIndex } from '../../../renderer/plots/cursor'
import { valueNear } from '../../../renderer/plots/marks'
import { usePlotZoom } from '../../../renderer/plots/usePlotZoom'
import { PLOT } from '../../core/report/models'

describe('a plot card', () => {
  it('names plot, unit and axis, and describes the picture in words', () => {
    const card = mount(PlotCard, { props: { model: PLOT }, attachTo: document.body })
    expect(card.text()).toContain('Energy & "loss"')
    expect(card.text()).toContain('mJ')
    expect(card.text()).toContain('Formation time')
    const canvas = card.get('canvas')
    expect(canvas.attributes('role')).toBe('img')
    expect(canvas.attributes('tabindex')).toBe('0')
    expect(canvas.attributes('aria-label')).toContain('second: 3 to 12 mJ')
    card.unmount()
  })

  it('reads values with units along the abscissa by arrow keys, and says them', async () => {
    const card = mount(PlotCard, { props: { model: PLOT }, attachTo: document.body })
    const canvas = card.get('canvas')
    await canvas.trigger('keydown', { key: 'End' })
    await nextTick()
    expect(card.get('dl').text()).toMatch(/formation time\s*4.*second\s*12\u00a0mJ/)
    await canvas.trigger('keydown', { key: 'ArrowLeft', shiftKey: true })
    await nextTick()
    expect(card.get('[aria-live]').text()).toContain('second 9\u00a0mJ')
    await canvas.trigger('keydown', { key: 'Escape' })
    expect(card.find('dl').exists()).toBe(false)
    card.unmount()
  })

  it('follows another model without being made anew and drops a cursor that has no point any more', async () => {
    const card = mount(PlotCard, { props: { model: PLOT }, attachTo: document.body })
    const canvas = card.get('canvas').element
    await card.get('canvas').trigger('keydown', { key: 'End' })
    const short = {
      ...PLOT,
      series: PLOT.series.map((series) => ({ ...series, x: series.x.slice(0, 5), y: series.y.slice(0, 5) })),
    }
    await card.setProps({ model: short })
    await nextTick()
    expect(card.get('canvas').element).toBe(canvas)
    expect(card.find('dl').exists()).toBe(false)
    card.unmount()
  })

  it('opens the table of its numbers and closes it again', async () => {
    const card = mount(PlotCard, { props: { model: PLOT }, attachTo: document.body })
    await card.get('button[aria-label^="Table"]').trigger('click')
    expect(card.findAll('tbody tr')).toHaveLength(41)
    expect(card.findAll('th').map((cell) => cell.text())).toContain('Energy & "loss", second (mJ)')
    await card.get('dialog').trigger('close')
    expect(card.find('dialog').exists()).toBe(false)
    card.unmount()
  })

  it('hands CSV and SVG to the page by name and kind', async () => {
    const card = mount(PlotCard, { props: { model: { ...PLOT, id: 'energy' } }, attachTo: document.body })
    await card.get('button[aria-label$="as CSV"]').trigger('click')
    await card.get('button[aria-label$="as SVG"]').trigger('click')
    const files = (card.emitted('export') ?? []).map(([file]) => file)
    expect(files).toMatchObject([
      { kind: 'csv', name: 'energy.csv' },
      { kind: 'svg', name: 'energy.svg' },
    ])
    expect(JSON.stringify(files[0])).toContain('4,16,12')
    card.unmount()
  })
})

describe('looking closer', () => {
  function zoomOf() {
    const model = shallowRef(PLOT)
    return { model, zoom: usePlotZoom(() => model.value) }
  }

  it('shows a part of the abscissa, in either order of its ends, and the whole again', () => {
    const { zoom } = zoomOf()
    zoom.look(3, 1)
    expect([zoom.shown.value.x.min, zoom.shown.value.x.max]).toEqual([1, 3])
    zoom.reset()
    expect(zoom.shown.value).toBe(PLOT)
  })

  it('never leaves the axis nor closes to nothing', () => {
    const { zoom } = zoomOf()
    zoom.look(-9, 2)
    expect([zoom.shown.value.x.min, zoom.shown.value.x.max]).toEqual([0, 2])
    zoom.look(1, 1.000001)
    expect(zoom.shown.value.x.max).toBe(2)
    zoom.magnify(0.1, null)
    expect(zoom.shown.value).toBe(PLOT)
  })

  it('keeps what is looked at while the plan is dragged, until the plot ends before it', async () => {
    const { model, zoom } = zoomOf()
    zoom.look(3, 4)
    model.value = { ...PLOT, x: { ...PLOT.x, max: 8 } }
    await nextTick()
    expect(zoom.shown.value.x.min).toBe(3)
    model.value = { ...PLOT, x: { ...PLOT.x, max: 2.4 } }
    await nextTick()
    expect(zoom.shown.value.x.max).toBe(2.4)
  })

  it('goes by keys about the cursor, and offers the whole plot', async () => {
    const card = mount(PlotCard, { props: { model: PLOT }, attachTo: document.body })
    await card.get('canvas').trigger('keydown', { key: '+' })
    const whole = card.findAll('button').find((button) => button.text() === 'Whole plot')
    expect(whole).toBeDefined()
    await whole?.trigger('click')
    expect(card.text()).not.toContain('Whole plot')
    card.unmount()
  })
})

describe('the data cursor', () => {
  it('stands on the nearest point', () => {
    expect(nearestIndex([0, 1, 3], 1.9)).toBe(1)
    expect(nearestIndex([0, 1, 3], 99)).toBe(2)
    expect(nearestIndex([], 1)).toBeNull()
  })

  it('reads between points in a straight line, and nothing in gaps or outside', () => {
    expect(valueNear([0, 2], [10, 20], 0.5)).toBe(12.5)
    expect(valueNear([0, 2], [10, null], 0.5)).toBeNull()
    expect(valueNear([0, 2], [10, 20], 3)).toBeNull()
  })

  it('leaves out a series that has no value there', () => {
    expect(cursorReadout(PLOT, 0.5).map(({ name }) => name)).toEqual(['formation time', at(PLOT.series, 0).name])
  })
})
