import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { readRingTable, RING_TABLE_KEYS, ringTable, SI_RING_UNITS, withRingValue } from '../../../core/plan'
import type { WakeRing } from '../../../core/filament'

const SHOWN = { ...SI_RING_UNITS, circulation: 'cm²/s', radius: 'mm', coreRadius: 'mm', x: 'mm', y: 'mm', z: 'mm' }

const PAIR: readonly WakeRing[] = [
  {
    circulation: 0.01,
    radius: 0.02,
    coreRadius: 0.002,
    core: 'uniform',
    centre: [0, 0, 0],
    direction: [1, 0, 0],
    axisRatio: 1,
    startTime: 0,
  },
  {
    circulation: 0.01,
    radius: 0.02,
    coreRadius: 0.002,
    core: 'gaussian',
    centre: [0.03, 0, 0],
    direction: [1, 0, 0],
    axisRatio: 1,
    startTime: 0.5,
  },
]

function rings(text: string, units = SI_RING_UNITS): readonly WakeRing[] {
  const reading = readRingTable(text, units)
  if (!reading.ok) throw new Error(reading.message)
  expect(reading.skipped).toEqual([])
  return reading.rings
}

describe('readRingTable', () => {
  it.each([
    [
      'labels with units',
      'Circulation (cm²/s),Radius (mm),Core radius (mm),Core,x (mm),Start (s)\r\n100,20,2,uniform,0,0\r\n100,20,2,Gaussian,30,0.5\r\n',
    ],
    [
      'keys, semicolons and decimal commas',
      'circulation;radius;coreRadius;core;x;startTime\n0,01;0,02;0,002;uniform;0;0\n0,01;0,02;0,002;gaussian;0,03;0,5\n',
    ],
    [
      'tabs, columns in another order, cells with units of their own, a comment and an empty line',
      '# pair\nradius (mm)\tx (cm)\tcirculation (cm²/s)\tcore radius (mm)\tstart\tcore\n20\t0\t100\t2 mm\t\t\n\n2 cm\t3\t100\t2\t500 ms\tgaussian\n',
    ],
  ])('reads %s', (_, text) => {
    expect(rings(text)).toEqual(PAIR)
  })

  it('reads bare columns in the order of the table, in the units handed in, and says so', () => {
    const reading = readRingTable('100\t20\t2\tuniform\t0\n100\t20\t2\tGaussian\t30\t0\t0\t1\t0\t0\t1\t0.5\n', SHOWN)
    expect(reading).toMatchObject({ ok: true, rings: PAIR, skipped: [] })
    expect(reading.ok && reading.notes.join(' ')).toMatch(
      /No heading: columns read as circulation in cm²\/s, radius in mm.*core/,
    )
  })

  it('takes the places right after the core radius where no column holds words', () => {
    expect(rings('0.01,0.02,0.002,0.5,0,0.1').map(({ centre }) => centre)).toEqual([[0.5, 0, 0.1]])
  })

  it('names the columns it leaves out', () => {
    const reading = readRingTable('circulation,radius,core radius,colour\n0.01,0.02,0.002,red\n')
    expect(reading.ok && reading.notes.join(' ')).toContain('Columns not used: “colour”.')
  })

  it('skips rows it cannot read, each with its line and why, and keeps the others', () => {
    const text = [
      'circulation (cm²/s),radius (mm),core radius (mm),core',
      '100,20,2,uniform',
      '100,wide,2,uniform',
      '100,20,40,uniform',
      '0,20,2,uniform',
      '100,20,,uniform',
      '100,20,2,solid',
      '90,20,2,hollow',
    ].join('\n')
    const reading = readRingTable(text)
    if (!reading.ok) throw new Error(reading.message)
    expect(reading.rings.map(({ circulation, core }) => [circulation, core])).toEqual([
      [0.01, 'uniform'],
      [0.009, 'hollow'],
    ])
    expect(reading.skipped.map(({ line }) => line)).toEqual([3, 4, 5, 6, 7])
    const messages = reading.skipped.map(({ message }) => message)
    expect(at(messages, 0)).toMatch(/^Line 3: Radius needs a length/)
    expect(at(messages, 1)).toMatch(/^Line 4: core radius must be at most 30\u00A0mm, got 40\u00A0mm\.$/)
    expect(at(messages, 2)).toMatch(/^Line 5: circulation must not be 0/)
    expect(at(messages, 3)).toMatch(/^Line 6: core radius must be given/)
    expect(at(messages, 4)).toMatch(/^Line 7: core must be one of uniform, hollow, Gaussian, got "solid"/)
  })

  it.each([
    ['', /empty/],
    ['radius (mm),core radius (mm)\n20,2\n', /must name circulation, got/],
    ['circulation (mm),radius (mm),core radius (mm)\n20,2,1\n', /Column "circulation \(mm\)" needs a circulation/],
    ['circulation,radius,core radius\n', /heading and no rows/],
    ['1,2\n', /this table has 2 columns/],
    ['a\u0000b', /plain text/],
  ])('refuses %j with a sentence', (text, message) => {
    const reading = readRingTable(text)
    expect(reading.ok ? 'accepted' : reading.message).toMatch(message)
  })

  it('reads back what the table writes, to the last digit, in any units', () => {
    const quantity = fc.double({ min: 1e-6, max: 10, noNaN: true })
    const place = fc.double({ min: -10, max: 10, noNaN: true }).map((value) => value + 0)
    const ring = fc.record({
      gamma: quantity,
      radius: quantity,
      ratio: fc.double({ min: 0.01, max: 1, noNaN: true }),
      x: place,
      z: place,
    })
    fc.assert(
      fc.property(
        fc.array(ring, { minLength: 1, maxLength: 5 }),
        fc.constantFrom(SI_RING_UNITS, SHOWN),
        (list, units) => {
          const made = list.map(({ gamma, radius, ratio, x, z }): WakeRing => ({
            ...at(PAIR, 0),
            circulation: -gamma,
            radius,
            coreRadius: radius * ratio,
            core: 'hollow',
            centre: [x, 0, z],
          }))
          const { header, rows } = ringTable(made, units)
          const text = [header, ...rows].map((cells) => cells.join('\t')).join('\n')
          expect(rings(text)).toEqual(made)
        },
      ),
      { numRuns: 50 },
    )
  })

  it('never throws on any text', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary' }), (text) => typeof readRingTable(text).ok === 'boolean'))
  })
})

describe('the ring table', () => {
  it('sets each column where it belongs', () => {
    for (const key of RING_TABLE_KEYS) {
      if (key === 'core') continue
      const before = ringTable([at(PAIR, 0)], SI_RING_UNITS).rows[0] ?? []
      const after = ringTable([withRingValue(at(PAIR, 0), key, 0.25)], SI_RING_UNITS).rows[0] ?? []
      const changed = RING_TABLE_KEYS.filter((_, column) => before[column] !== after[column])
      expect(changed).toEqual([key])
      expect(after[RING_TABLE_KEYS.indexOf(key)]).toBe('0.25')
    }
  })
})
