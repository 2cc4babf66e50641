import { describe, expect, it } from 'vitest'
import { levelsText, readLevels } from '../../../renderer/model/levelList'

const LIMITS = { above: 0, max: 1 }
const read = (text: string) => readLevels(text, 'Stroke', 'length', 'mm', LIMITS)

describe('levels as they are typed', () => {
  it.each([
    ['25, 37.5, 50 mm', [0.025, 0.0375, 0.05]],
    ['25 mm; 5 cm', [0.025, 0.05]],
    // The last unit stands for bare numbers only.
    ['25, 3 mm, 5 cm', [0.25, 0.003, 0.05]],
    ['25; 37,5; 50', [0.025, 0.0375, 0.05]],
    ['25', [0.025]],
    ['10 to 40 mm in 4', [0.01, 0.02, 0.03, 0.04]],
    ['1 cm to 40 mm in 4', [0.01, 0.02, 0.03, 0.04]],
  ])('%s is read', (text, values) => expect(read(text)).toEqual({ ok: true, values }))

  it.each([
    ['', /at least one level/],
    ['25, 12 mL', /length such as 12 mm; 12 mL is a volume/],
    ['25, 2 m', /at most 1.m\. You entered 25.m/],
    ['25, 25 mm', /has a level twice/],
    ['10 to 40 mm in 1', /2 to 100 levels/],
    ['25 50', /./],
  ])('%j is refused in a sentence', (text, sentence) => {
    const reading = read(text)
    expect(reading.ok ? '' : reading.message).toMatch(sentence)
  })

  it('reads back what it writes', () => {
    expect(levelsText([0.025, 0.0375], 'mm')).toBe('25, 37.5 mm')
    expect(read(levelsText([0.025, 0.0375], 'mm'))).toEqual({ ok: true, values: [0.025, 0.0375] })
    expect(levelsText([1, 2], '')).toBe('1, 2')
  })
})
