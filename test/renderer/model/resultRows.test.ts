import { describe, expect, it } from 'vitest'
import { defaultPlan, EXAMPLES, examplePlan, setField, setStrokeRatio, type Plan } from '../../../core/plan'
import { fromBase } from '../../../core/quantity'
import { EXPLANATION_IDS } from '../../../core/report'
import { run, type RunData } from '../../../core/run'
import {
  estimateRows,
  furtherRows,
  magnitudesOf,
  marginRow,
  ringRows,
  trailingRow,
} from '../../../renderer/model/resultRows'
import { shownUnits } from '../../../renderer/model/units'

async function compute(plan: Plan) {
  const { data } = await run(plan, { sections: ['water', 'pulse'], jet: 'cached' })
  if (data === null || data.pulse === null) throw new Error('nothing was computed')
  const units = shownUnits({}, magnitudesOf(data.pulse))
  return { plan, data: data satisfies RunData, pulse: data.pulse, units }
}

describe('result rows', () => {
  it('shows the range from slug to quick start as the figure and the adopted value as a note', async () => {
    const { plan, pulse, units } = await compute(examplePlan('inspection-thruster'))
    const row = ringRows(plan, pulse, units)[0]
    const ends = [pulse.ringFromSlug?.circulation ?? 0, pulse.ringWithOverPressure?.circulation ?? 0]
    const [low, high] = ends.map((end) => Math.round(fromBase(end, 'cm²/s')))
    expect(row?.figure).toBe(`${low} to ${high}`)
    expect(row?.notes[0]).toBe('slug, to slug with quick start')
    expect(row?.notes[1]).toMatch(/^adopted .*cm²\/s, slug only$/u)
  })

  it('shows one value, and says why, where the start is too slow for over-pressure', async () => {
    const { plan, pulse, units } = await compute(examplePlan('millimetre-nozzle'))
    expect(pulse.ringWithOverPressure).toBeNull()
    const row = ringRows(plan, pulse, units)[0]
    expect(row?.figure).not.toContain('to')
    expect(row?.notes[0]).toContain('too slow')
  })

  it('has the margin over every estimate, and the adopted one in a note', async () => {
    const { plan, pulse, units } = await compute(setStrokeRatio(defaultPlan(), 2))
    const { speedMatch, published } = pulse.formationNumber
    const row = marginRow(plan, pulse, units)
    // The lowest of them is the speed match, the highest the end of the published band.
    expect(row?.figure).toBe(`${((speedMatch ?? 0) - 2).toFixed(1)} to ${((published?.[1] ?? 0) - 2).toFixed(1)}`)
    expect(row?.notes[0]).toBe('over every estimate and the published band')
    expect(row?.notes[1]).toMatch(/^energy limit, adopted: 1\.\d D, \d+\u00A0mm$/u)
  })

  it('has no margin and no ring in a counter-flow that lets none form', async () => {
    const { plan, pulse, units } = await compute(setField(defaultPlan(), 'ambient.axialFlow', -0.06))
    expect(marginRow(plan, pulse, units)).toBeNull()
    expect(pulse.ring).toBeNull()
    expect(ringRows(plan, pulse, units)).toEqual([])
    expect(estimateRows(plan, pulse).map((row) => row.value)).toEqual(['none', 'none', 'none', 'none'])
  })

  it('tells what trails only past pinch-off', async () => {
    const past = await compute(examplePlan('past-pinch-off'))
    expect(trailingRow(past.pulse, past.units)?.notes[0]).toMatch(/% of the pulse's impulse/u)
    const before = await compute(defaultPlan())
    expect(trailingRow(before.pulse, before.units)).toBeNull()
  })

  it('gives every found value of every example an explanation that exists', async () => {
    for (const example of EXAMPLES) {
      const { plan, data, pulse, units } = await compute(examplePlan(example.id))
      const rows = [
        ...ringRows(plan, pulse, units),
        ...estimateRows(plan, pulse),
        ...furtherRows(data, pulse, units),
        ...[marginRow(plan, pulse, units), trailingRow(pulse, units)].filter((row) => row !== null),
      ]
      expect(rows.length).toBeGreaterThan(10)
      for (const row of rows) expect(EXPLANATION_IDS, row.id).toContain(row.id)
    }
  })
})

describe('shown units', () => {
  it('keeps the chosen unit whatever the size, and passes over a unit of another dimension', () => {
    expect(shownUnits({ impulse: 'N·s' }, { impulse: 1e-7 }).impulse).toBe('N·s')
    expect(shownUnits({ length: 'mL' }).length).toBe('mm')
  })

  it('moves to a neighbouring unit where nobody chose and the usual one fits badly', () => {
    expect(shownUnits({}, { impulse: 1.72e-7 }).impulse).toBe('µN·s')
    expect(shownUnits({}, { impulse: 0.0145 }).impulse).toBe('mN·s')
    expect(shownUnits({}, { impulse: 250 }).impulse).toBe('N·s')
    expect(shownUnits({}, { time: 0.0224 }).time).toBe('ms')
    expect(shownUnits({}, { energy: 0 }).energy).toBe('mJ')
  })
})
