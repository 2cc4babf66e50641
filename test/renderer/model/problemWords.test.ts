import { describe, expect, it } from 'vitest'
import { defaultPlan, setChoice, setField, validatePlan } from '../../../core/plan'
import { problemInWords } from '../../../renderer/model/problemWords'

describe('problemInWords', () => {
  it('names fields as they are named beside their boxes', () => {
    expect(problemInWords('nozzle.diameter must be at most 10 m, got 40 m')).toBe(
      'Exit diameter must be at most 10 m, got 40 m',
    )
    expect(problemInWords('the ratio to nozzle.diameter')).toBe('the ratio to exit diameter')
    expect(problemInWords('A programme table needs at least 3 rows, got 0.')).toBe(
      'A programme table needs at least 3 rows, got 0.',
    )
  })

  it('counts what stands in the lists of a wake from 1, and names it as its table does', () => {
    expect(problemInWords('wake.rings.1.coreRadius must be at most 0.03 m, got 0.04 m')).toBe(
      'Core radius of ring 2 must be at most 0.03 m, got 0.04 m',
    )
    expect(problemInWords('wake.nozzles.0.direction.2 must be a finite number, got Infinity')).toBe(
      'Direction z of nozzle 1 must be a finite number, got Infinity',
    )
    expect(problemInWords('wake.stations.0 must be a length')).toBe('Station 1 must be a length')
    expect(problemInWords('wake.wall must not stand across the stream: ambient.axialFlow must be 0 with it')).toBe(
      'The wall must not stand across the stream: flow past it must be 0 with it',
    )
    expect(problemInWords('wake.wall.normal.0 must be a number')).toBe('Normal x of the wall must be a number')
    expect(problemInWords('wake.model must be auto or filament for these rings')).toMatch(/^The engine must be/)
    expect(problemInWords('train.pulses must be at least 1, got 0')).toBe('Pulses must be at least 1, got 0')
  })

  it('leaves no path in what a plan with missing values is told', () => {
    const problems = validatePlan(setField(setChoice(defaultPlan(), 'water.kind', 'given'), 'water.density', null))
    expect(problems.length).toBeGreaterThan(0)
    for (const problem of problems) expect(problemInWords(problem.message)).not.toMatch(/\w\.\w/u)
  })

  it('names duty points, rows of drag and ranges of a search, and cuts numbers nobody reads', () => {
    expect(problemInWords('thruster.target.1.speed must be above 0 m/s, got 0 m/s')).toBe(
      'Speed wanted of duty point 2 must be above 0 m/s, got 0 m/s',
    )
    expect(problemInWords('thruster.vehicle.drag.rows.2.drag must be at least 0 N')).toBe(
      'Drag of row 3 of the drag table must be at least 0 N',
    )
    expect(problemInWords('thruster.search.diameter must run from low to high')).toBe(
      'The range of exit diameters must run from low to high',
    )
    expect(problemInWords("train.period must be above the stroke's 0.19634954084936207 s")).toBe(
      "Period must be above the stroke's 0.19635 s",
    )
    expect(problemInWords('thruster.actuator.ejectShare must be at most 0.99')).toBe('Eject share must be at most 0.99')
  })
})
