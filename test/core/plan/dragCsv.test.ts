import { describe, expect, it } from 'vitest'
import { readDragTable } from '../../../core/plan'

function read(text: string, units?: Parameters<typeof readDragTable>[1]) {
  const reading = readDragTable(text, units)
  if (!reading.ok) throw new Error(reading.message)
  return reading
}

describe('readDragTable', () => {
  it('reads headed columns in any order and unit', () => {
    const { rows, skipped } = read('drag (mN),speed (cm/s)\n200,20\n1400,60\n')
    expect(rows).toEqual([
      { speed: 0.2, drag: 0.2 },
      { speed: 0.6, drag: 1.4 },
    ])
    expect(skipped).toEqual([])
  })

  it('reads bare columns in the units shown, and decimal commas', () => {
    expect(read('0,5\t1,1\n1,0\t3,6', { speed: 'm/s', drag: 'N' }).rows).toEqual([
      { speed: 0.5, drag: 1.1 },
      { speed: 1, drag: 3.6 },
    ])
  })

  it('sorts by speed and leaves out bad rows with their line and why', () => {
    const { rows, skipped } = read(
      'speed (m/s);drag (N)\n1;3,6\n0,5;x\n# by the towing tank\n0,2;-1\n1;3,7\n0,4;0,7\n0,3;',
    )
    expect(rows.map(({ speed }) => speed)).toEqual([0.4, 1])
    expect(skipped.map(({ line }) => line)).toEqual([3, 5, 6, 8])
    expect(skipped.map(({ message }) => message)).toEqual([
      expect.stringMatching(/^Line 3: /),
      'Line 5: drag must be at least 0, got "-1".',
      'Line 6: its speed stands in line 2 already.',
      'Line 8: drag must be given.',
    ])
  })

  it.each([
    ['', /empty/],
    ['1\n2\n', /two columns/],
    ['time (s),drag (N)\n1,2\n2,3', /must name a column of speed/],
    ['speed (m/s),drag (s)\n1,2\n2,3', /drag/i],
    ['speed (m/s),drag (N)\n1,2', /at least 2 rows/],
  ])('refuses %j with a sentence', (text, why) => {
    const reading = readDragTable(text)
    expect(reading.ok).toBe(false)
    expect(reading.ok ? '' : reading.message).toMatch(why)
  })
})
