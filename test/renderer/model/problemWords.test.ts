import { describe, expect, it } from 'vitest'
import { defaultPlan, setChoice, validatePlan } from '../../../core/plan'
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

  it('leaves no path in what a plan with missing values is told', () => {
    const problems = validatePlan(setChoice(defaultPlan(), 'water.kind', 'given'))
    expect(problems.length).toBeGreaterThan(0)
    for (const problem of problems) expect(problemInWords(problem.message)).not.toMatch(/\w\.\w/u)
  })
})
