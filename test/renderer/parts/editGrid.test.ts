import { mount } from '@vue/test-utils'
import { nextTick } from 'vue'
import { afterEach, describe, expect, it } from 'vitest'
import { copyCells } from '../../../renderer/parts/copyCells'
import EditGrid from '../../../renderer/parts/EditGrid.vue'
import type { GridColumn } from '../../../renderer/parts/gridTypes'

const COLUMNS: readonly GridColumn[] = [
  { key: 'radius', label: 'Radius', unit: 'mm', dimension: 'length', help: '', limits: { above: 0 } },
  {
    key: 'core',
    label: 'Core',
    unit: '',
    dimension: 'number',
    help: '',
    options: { uniform: 'uniform', hollow: 'hollow' },
  },
]
const ROWS = [
  [0.02, 'uniform'],
  [0.03, 'hollow'],
  [0.04, 'uniform'],
]

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

function gridOf(refusals = new Map<string, string>()) {
  const wrapper = mount(EditGrid, {
    attachTo: document.body,
    props: {
      label: 'Rings',
      rowName: 'ring',
      columns: COLUMNS,
      rows: ROWS,
      refusals,
      asText: (rows: readonly number[]) => ({
        header: ['Radius (mm)'],
        rows: rows.map((row) => [String(ROWS[row]?.[0])]),
      }),
    },
  })
  mounted.push(wrapper)
  const cell = (row: number, column: number) => wrapper.get(`[data-cell="${row} ${column}"]`)
  const focused = () => document.activeElement?.getAttribute('data-cell') ?? null
  const press = async (key: string, more: object = {}) => {
    const target = wrapper.find('td input').exists()
      ? wrapper.get('td input')
      : wrapper.get(`[data-cell="${focused()}"]`)
    await target.trigger('keydown', { key, ...more })
    await nextTick()
    await nextTick()
  }
  const start = async (row: number, column: number) => {
    const element = cell(row, column).element
    if (element instanceof HTMLElement) element.focus()
    await nextTick()
  }
  return { wrapper, cell, focused, press, start }
}

describe('EditGrid', () => {
  it('is one tab stop that arrows, Home and End move', async () => {
    const { wrapper, focused, press, start } = gridOf()
    expect(wrapper.findAll('[tabindex="0"]')).toHaveLength(1)
    await start(0, 1)
    await press('ArrowDown')
    expect(focused()).toBe('1 1')
    await press('End')
    expect(focused()).toBe('1 2')
    await press('Home')
    expect(focused()).toBe('1 0')
    await press('End', { ctrlKey: true })
    expect(focused()).toBe('2 2')
    expect(wrapper.findAll('tbody [tabindex="0"]')).toHaveLength(1)
  })

  it('edits with F2, takes a value with its unit by Enter and stays', async () => {
    const { wrapper, focused, press, start } = gridOf()
    await start(0, 1)
    await press('F2')
    await wrapper.get('td input').setValue('2.5 cm')
    await press('Enter')
    expect(wrapper.emitted('edit')).toEqual([[0, 'radius', 0.025]])
    expect(focused()).toBe('0 1')
  })

  it('begins with the letter that was pressed, and Escape puts the old value back', async () => {
    const { wrapper, cell, press, start } = gridOf()
    await start(1, 1)
    await press('4')
    const input = wrapper.get('td input').element
    expect(input instanceof HTMLInputElement && input.value).toBe('4')
    await press('Escape')
    expect(cell(1, 1).text()).toBe('30')
    expect(wrapper.emitted('edit')).toBeUndefined()
  })

  it('keeps what cannot be read in its cell, with a sentence that names the row', async () => {
    const { wrapper, cell, press, start } = gridOf()
    await start(1, 1)
    await press('F2')
    await wrapper.get('td input').setValue('-3 mm')
    await press('Enter')
    expect(cell(1, 1).text()).toBe('-3 mm')
    expect(cell(1, 1).attributes('aria-invalid')).toBe('true')
    expect(wrapper.get('.grid-refusals').text()).toMatch(/^Ring 2: Radius must be above 0/)
    await press('Escape')
    expect(cell(1, 1).text()).toBe('30')
    expect(wrapper.get('.grid-refusals').text()).toBe('')
  })

  it('chooses words from a list', async () => {
    const { wrapper, press, start } = gridOf()
    await start(0, 2)
    await press('Enter')
    await wrapper.get('td select').setValue('hollow')
    expect(wrapper.emitted('edit')).toEqual([[0, 'core', 'hollow']])
  })

  it('marks rows with Shift, moves them with Alt and takes them out with Delete', async () => {
    const { wrapper, press, start } = gridOf()
    await start(1, 0)
    await press('ArrowDown', { shiftKey: true })
    await press('ArrowUp', { altKey: true })
    expect(wrapper.emitted('move')).toEqual([[[1, 2], -1]])
    await press('Delete')
    expect(wrapper.emitted('remove')).toEqual([[[0, 1]]])
  })

  it('hands pasted tables on, and takes a lone value into its cell', async () => {
    const { wrapper, cell, start } = gridOf()
    await start(0, 1)
    const clipboard = (text: string) => ({ clipboardData: { getData: () => text } })
    await cell(0, 1).trigger('paste', clipboard('1\t2\n3\t4\n'))
    expect(wrapper.emitted('paste')).toEqual([['1\t2\n3\t4\n']])
    await cell(0, 1).trigger('paste', clipboard('35'))
    expect(wrapper.emitted('edit')).toEqual([[0, 'radius', 0.035]])
  })

  it('copies the marked rows as tab-separated text and as HTML', async () => {
    const { wrapper, cell, start } = gridOf()
    await start(1, 1)
    const held = new Map<string, string>()
    await cell(1, 1).trigger('copy', {
      clipboardData: { setData: (type: string, text: string) => held.set(type, text) },
    })
    expect(held.get('text/plain')).toBe('Radius (mm)\n0.03\n')
    expect(held.get('text/html')).toContain('<td>0.03</td>')
    expect(wrapper.get('[role=status]').text()).toBe('1 row copied.')
  })

  it('shows what the plan refuses at its cells, each sentence once', () => {
    const sentence = 'Centre of ring 1 must leave the ring clear of the wall'
    const { wrapper, cell } = gridOf(
      new Map([
        ['0 radius', sentence],
        ['0 core', sentence],
      ]),
    )
    expect(cell(0, 2).attributes('aria-invalid')).toBe('true')
    expect(wrapper.findAll('.grid-refusals li')).toHaveLength(1)
  })
})

describe('copyCells', () => {
  it('writes signs of HTML as text', () => {
    expect(copyCells({ header: ['a<b'], rows: [['1&2']] }).html).toBe(
      '<table><tr><th>a&lt;b</th></tr><tr><td>1&amp;2</td></tr></table>',
    )
  })
})
