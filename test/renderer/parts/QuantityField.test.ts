import { mount } from '@vue/test-utils'
import { afterEach, describe, expect, it } from 'vitest'
import QuantityField from '../../../renderer/parts/QuantityField.vue'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

function field(props: Record<string, unknown> = {}) {
  const wrapper = mount(QuantityField, {
    attachTo: document.body,
    props: {
      label: 'Exit diameter',
      value: 0.03,
      dimension: 'length',
      unit: 'mm',
      limits: { min: 1e-4, max: 10 },
      ...props,
    },
  })
  mounted.push(wrapper)
  const input = wrapper.get('input')
  const committed = () => wrapper.emitted('commit')
  return { wrapper, input, committed, text: () => input.element.value }
}

describe('QuantityField', () => {
  it('shows the value in its unit and all its digits in the title', () => {
    const { text, input } = field({ value: 0.0312345678 })
    expect(text()).toBe('31.23\u00A0mm')
    expect(input.attributes('title')).toBe('31.2345678\u00A0mm')
  })

  it('commits on Enter and on leaving, in the base unit', async () => {
    const { input, committed } = field()
    await input.setValue('45')
    await input.trigger('keydown', { key: 'Enter' })
    await input.setValue('0.5 in')
    await input.trigger('blur')
    expect(committed()).toEqual([
      [0.045, 'typed'],
      [0.0127, 'typed'],
    ])
  })

  it('keeps what was typed when it refuses, and says why where a screen reader finds it', async () => {
    const { wrapper, input, committed, text } = field()
    await input.setValue('12 mL')
    await input.trigger('keydown', { key: 'Enter' })
    expect(text()).toBe('12 mL')
    expect(committed()).toBeUndefined()
    expect(input.attributes('aria-invalid')).toBe('true')
    const described = input.attributes('aria-describedby')?.split(' ') ?? []
    const sentences = described.map((id) => document.getElementById(id)?.textContent)
    expect(sentences).toContain('Exit diameter needs a length such as 12 mm; 12 mL is a volume.')
    await input.setValue('12 mm')
    expect(input.attributes('aria-invalid')).toBe('false')
    expect(wrapper.find('.refusal').text()).toBe('')
  })

  it('refuses an ambiguous comma with both readings', async () => {
    const { wrapper, input } = field()
    await input.setValue('1,500')
    await input.trigger('blur')
    expect(wrapper.get('.refusal').text()).toContain('1.5 mm or as 1500 mm')
  })

  it('puts the old value back on Escape', async () => {
    const { input, committed, text } = field()
    await input.setValue('99')
    await input.trigger('keydown', { key: 'Escape' })
    expect(text()).toBe('30\u00A0mm')
    await input.trigger('blur')
    expect(committed()).toBeUndefined()
  })

  it('steps by the last digit shown, ten times with Shift, a tenth with Alt', async () => {
    const { input, committed } = field({ value: 0.0125 })
    await input.trigger('keydown', { key: 'ArrowUp' })
    await input.trigger('keydown', { key: 'ArrowDown', shiftKey: true })
    await input.trigger('keydown', { key: 'ArrowUp', altKey: true })
    expect(committed()).toEqual([
      [0.0126, 'stepped'],
      [0.0115, 'stepped'],
      [0.01251, 'stepped'],
    ])
  })

  it('does not step over its limit and says the limit', async () => {
    const { wrapper, input, committed } = field({ value: 10, unit: 'm' })
    await input.trigger('keydown', { key: 'ArrowUp' })
    expect(committed()).toBeUndefined()
    expect(wrapper.get('.refusal').text()).toBe('Exit diameter must be at most 10\u00A0m. You entered 11\u00A0m.')
  })

  it('does not shorten a value whose digits are not all shown by being left', async () => {
    const { input, committed } = field({ value: 0.0312345678 })
    await input.setValue('31.23\u00A0mm')
    await input.trigger('blur')
    expect(committed()).toBeUndefined()
  })

  it('follows a value changed elsewhere, also while something is typed', async () => {
    const { wrapper, input, text } = field()
    await input.setValue('12 mL')
    await wrapper.setProps({ value: 0.04 })
    expect(text()).toBe('40\u00A0mm')
  })

  it('lets an optional value be emptied', async () => {
    const { input, committed } = field({ limits: { optional: true, min: 0.3, max: 1 }, dimension: 'number', unit: '' })
    await input.setValue('')
    await input.trigger('blur')
    expect(committed()).toEqual([[null, 'typed']])
  })
})
