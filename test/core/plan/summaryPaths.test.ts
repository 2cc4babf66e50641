import { describe, expect, it } from 'vitest'
import { summaryNumber, summaryValue } from '../../../core/plan'

const DOCUMENT = {
  pulse: { ring: null, speed: 0.5, pinchedOff: false, low: Number.POSITIVE_INFINITY },
  jet: undefined,
  tankRun: { arrivals: [{ time: 1 }, { time: null }] },
}

describe('values of the summary by their paths', () => {
  it.each([
    ['pulse.speed', 0.5],
    ['pulse.pinchedOff', false],
    ['tankRun.arrivals.0.time', 1],
    ['tankRun.arrivals.1.time', null],
    // What is missing here may be there in another plan.
    ['pulse.ring.speed', null],
    ['jet.formationNumber', null],
    ['tankRun.arrivals.7.time', null],
  ])('%s is %j', (path, value) => {
    expect(summaryValue(DOCUMENT, path)).toEqual({ known: true, value })
  })

  it.each(['pulse', 'pulse.sped', 'wake.passes', 'tankRun.arrivals', 'tankRun.arrivals.x.time', 'pulse.toString'])(
    '%s is no value',
    (path) => {
      expect(summaryValue(DOCUMENT, path)).toEqual({ known: false })
    },
  )

  it('gives a number only where it is one, and finite', () => {
    expect(summaryNumber(DOCUMENT, 'pulse.speed')).toBe(0.5)
    expect(summaryNumber(DOCUMENT, 'pulse.low')).toBeNull()
    expect(summaryNumber(DOCUMENT, 'pulse.pinchedOff')).toBeNull()
  })
})
