import { beforeAll, describe, expect, it } from 'vitest'
import {
  defaultPlan,
  examplePlan,
  setThruster,
  startSearch,
  startThruster,
  validatePlan,
  type Plan,
} from '../../../core/plan'
import { run } from '../../../core/run'
import { candidateRows, sortedRows } from '../../../renderer/model/candidateRows'
import {
  bounded,
  differenceInWords,
  furtherThrustRows,
  limitRows,
  thrustMagnitudes,
  thrustRows,
  timeInWords,
  wayInWords,
} from '../../../renderer/model/thrustRows'
import { shownUnits } from '../../../renderer/model/units'

const NOZZLE = examplePlan('survey-vehicle').nozzle

async function rowsOf(plan: Plan) {
  const { data, message } = await run(plan, { sections: ['thruster'], sizing: 'off' })
  const section = plan.thruster
  if (data === null || data.thruster === null || section === null) throw new Error(message)
  const { result } = data.thruster
  const units = shownUnits({}, thrustMagnitudes(result))
  return {
    result,
    main: thrustRows(section, result, units),
    further: furtherThrustRows(section, result, units),
    limits: limitRows(section, result, units),
  }
}

const text = (row: { readonly figure: string; readonly unit: string } | undefined): string =>
  `${row?.figure ?? ''} ${row?.unit ?? ''}`

describe('figures of a thruster', () => {
  let vehicle: Awaited<ReturnType<typeof rowsOf>>
  beforeAll(async () => {
    vehicle = await rowsOf(examplePlan('survey-vehicle'))
  })

  it('name both efficiencies and never one for the other', () => {
    const { main, result } = vehicle
    const froude = main.find(({ id }) => id === 'froude')
    const overall = main.find(({ id }) => id === 'overall')
    expect(froude?.label).toBe('Froude efficiency')
    expect(overall?.label).toBe('Overall efficiency')
    expect(froude?.value).toBe(result.froudeEfficiency)
    expect(overall?.value).toBe(result.overallEfficiency)
    expect([text(froude), text(overall)]).toEqual(['63.3 %', '21.3 %'])
  })

  it('tell thrust, speed and power in units that fit', () => {
    expect(vehicle.main.map(({ label }) => label)).toEqual([
      'Mean thrust',
      'Cruise speed',
      'Total power',
      'Froude efficiency',
      'Overall efficiency',
    ])
    expect(vehicle.main.slice(0, 3).map(text)).toEqual(['1.38 N', '0.611 m/s', '3.94 W'])
    expect(vehicle.main[1]?.notes.join()).toMatch(/95\u00A0?.*% of it after 38\.4/)
  })

  it('tell the way to cruise only where the speed is that of cruise', async () => {
    const plan = examplePlan('survey-vehicle')
    const vehicle = plan.thruster?.vehicle ?? null
    if (vehicle === null) throw new Error('the example has no vehicle')
    const held = await rowsOf(setThruster(plan, { vehicle: { ...vehicle, speed: 0.9 } }))
    const notes = held.main.find(({ label }) => label === 'Held speed')?.notes.join()
    expect(notes).toContain('missing')
    expect(notes).not.toContain('of it after')
  })

  it('put what is broken first, then what has least room', () => {
    const { limits } = vehicle
    expect(limits[0]).toMatchObject({ name: 'thrust, duty point 2', ok: false })
    const held = limits.filter(({ ok }) => ok).map(({ room }) => room)
    expect(held).toEqual([...held].sort((a, b) => a - b))
    expect(limits.find(({ name }) => name === 'plunger travel')).toMatchObject({
      value: '50\u00A0mm',
      limit: 'at most 80\u00A0mm',
    })
  })

  it('have no efficiencies on a bench', async () => {
    const { main } = await rowsOf(examplePlan('bench-thruster'))
    expect(main.map(({ label }) => label)).toEqual(['Mean thrust', 'Total power'])
  })

  it('say where there is no bound, and never NaN', async () => {
    const plan = examplePlan('survey-vehicle')
    const jumping = await rowsOf({ ...plan, programme: { ...plan.programme, shape: 'rectangular', peakSpeed: 1 } })
    const all = [...jumping.main, ...jumping.further].map((row) => `${text(row)} ${row.notes.join(' ')}`)
    const words = [...all, ...jumping.limits.map(({ value, limit }) => `${value} ${limit}`)].join('\n')
    expect(words).toMatch(/no bound/)
    expect(words).not.toMatch(/NaN|Infinity|undefined/)
    expect(jumping.limits.find(({ name }) => name === 'plunger force')).toMatchObject({ value: 'no bound', ok: false })
  })

  it('are told against a held design in per cent', () => {
    expect(differenceInWords(2, 1)).toBe('+100 %')
    expect(differenceInWords(0.93, 1)).toBe('−7 %')
    expect(differenceInWords(1.0001, 1)).toBe('the same')
    expect(differenceInWords(null, 1)).toBeNull()
    expect(differenceInWords(Infinity, 1)).toBeNull()
    expect(differenceInWords(1, 0)).toBeNull()
  })

  it('put spans of time and way as one says them', () => {
    expect([38.4, 600, 9000, 400_000].map(timeInWords)).toEqual([
      '38.4\u00A0s',
      '10\u00A0min',
      '2.5\u00A0h',
      '4.63\u00A0days',
    ])
    expect([15.1, 5400].map(wayInWords)).toEqual(['15.1\u00A0m', '5.4\u00A0km'])
    expect(bounded(-Infinity, 'Pa')).toBe('no bound')
  })
})

describe('a thruster that begins on a plan', () => {
  it.each(['vehicle', 'bench'] as const)('asks of a %s what this pulse gives', async (on) => {
    const plan = defaultPlan()
    const { data } = await run(plan, { sections: ['pulse'] })
    const next = startThruster(plan, on, data?.pulse ?? null, data?.water.density ?? 1000)
    expect(validatePlan(next)).toEqual([])
    const { result } = await rowsOf(next)
    expect(result.duties).toHaveLength(1)
    expect(result.duties[0]?.shortfall).toBe(0)
    // Of the order of what it gives: asked for with two digits.
    expect((result.duties[0]?.needed ?? 0) / (result.duties[0]?.thrust ?? 1)).toBeGreaterThan(0.85)
    expect(next.thruster?.search?.diameter[0]).toBeLessThan(plan.nozzle.diameter)
  })

  it('adds ranges around the plan where only the search is missing', () => {
    const plan = setThruster(examplePlan('survey-vehicle'), { search: null })
    expect(startSearch(plan).thruster?.search?.diameter).toEqual([0.025, 0.1])
  })
})

describe('candidates as rows', () => {
  it('are sorted by any column and keep their number', async () => {
    const { data } = await run(examplePlan('survey-vehicle'), { sections: ['thruster'] })
    const candidates = data?.thruster?.sizing?.candidates ?? []
    const rows = candidateRows(candidates, shownUnits({}), NOZZLE)
    expect(rows.map(({ number }) => number)).toEqual(candidates.map((_, i) => i + 1))
    // Opening one keeps the proportions of the nozzle.
    rows.forEach(({ values, candidate: { design } }) => {
      expect(values.nozzleLength / design.diameter).toBeCloseTo(NOZZLE.length / NOZZLE.diameter, 12)
      expect(values.plunger / design.diameter).toBeCloseTo(NOZZLE.pistonDiameter / NOZZLE.diameter, 12)
    })
    const bySize = sortedRows(rows, { column: 'swept', falling: false })
    const sizes = bySize.map(({ values }) => values.swept)
    expect(sizes).toEqual([...sizes].sort((a, b) => a - b))
    expect(sortedRows(rows, { column: 'swept', falling: true })[0]).toBe(bySize.at(-1))
    for (const { note } of rows) expect(note).not.toBe('')
  }, 30_000)
})
