import { describe, expect, it } from 'vitest'
import { explainTank, pistonPlots, plotToSvg, TANK_EXPLANATION_IDS, tankPlots, targetPlot } from '../../../core/report'
import { expectClose } from '../../support/close'
import { tankCase, UNITS } from './tankRuns'
import { readXml } from './xml'

const SIZE = { width: 640, height: 400, theme: 'light' } as const

describe('plots of a tank run', () => {
  it('put the ring at each station at the time of its arrival, between slowest and fastest', async () => {
    const { result } = await tankCase()
    const [place] = tankPlots(result, UNITS)
    const [ring, fastest, slowest] = place?.series ?? []
    expect([ring?.id, fastest?.id, slowest?.id]).toEqual(['ring', 'fastest', 'slowest'])
    const last = (ring?.x.length ?? 0) - 1
    // The path ends a step of its output after the last arrival.
    expectClose(ring?.x[last] ?? 0, result.arrivals[2]?.time ?? 0, 2e-3)
    expectClose(ring?.y[last] ?? 0, 300, 2e-3)
    ring?.y.forEach((value, i) => {
      expect(slowest?.y[i] ?? Infinity).toBeLessThanOrEqual((value ?? 0) + 1e-9)
      expect(fastest?.y[i] ?? -Infinity).toBeGreaterThanOrEqual((value ?? 0) - 1e-9)
    })
    expect(place?.lines.map(({ label }) => label)).toEqual(['100\u00a0mm', '200\u00a0mm', '300\u00a0mm'])
  })

  it('shade the range between its ends, in window and file from one model', async () => {
    const { result } = await tankCase()
    const [place] = tankPlots(result, UNITS, {
      x: [1, 2],
      nominal: [0.1, 0.2],
      p05: [0.09, 0.18],
      p50: [0.1, 0.2],
      p95: [0.11, 0.22],
    })
    expect(place?.series.flatMap(({ id, fillTo }) => (fillTo === undefined ? [] : [[id, fillTo]]))).toEqual([
      ['fastest', 'slowest'],
      ['p95', 'p05'],
    ])
    if (place === undefined) throw new Error('no plot')
    const svg = plotToSvg(place, SIZE)
    readXml(svg)
    expect(svg.match(/Z" fill="[^"]+" fill-opacity="0\.15"/g)).toHaveLength(2)
  })

  it('draw a limit of the drive only where the motion comes near it', async () => {
    const far = await tankCase()
    expect(pistonPlots(far.result.profile, UNITS).map(({ lines }) => lines.length)).toEqual([0, 0, 0])
    const { drive } = far.plan.tankRun ?? {}
    if (drive === undefined) throw new Error('no drive')
    const near = await tankCase({ drive: { ...drive, maxSpeed: 0.03, maxAcceleration: 1.3 } })
    const [, speed, acceleration] = pistonPlots(near.result.profile, UNITS)
    expect(speed?.lines.map(({ value, kind }) => [value, kind])).toEqual([[0.03, 'limit']])
    expect(acceleration?.lines.map(({ value }) => value)).toEqual([1.3, -1.3])
  })

  it('part strokes that the drive follows from those it cannot', async () => {
    const { result, plan } = await tankCase({ target: { kind: 'circulation', value: 0.005 } })
    const model = targetPlot(result.solutions, plan.programme.stroke, UNITS)
    const [asked, followed] = model.series
    expect([asked?.id, followed?.id]).toEqual(['asked', 'followed'])
    const cannot = result.solutions.findIndex(({ ok, peakSpeed }) => !ok && peakSpeed !== null)
    expect(followed?.y[cannot]).toBeNull()
    expect(asked?.y[cannot]).toBeGreaterThan(0)
    expect(model.lines[0]?.value).toBeCloseTo(62.5, 9)
  })
})

describe('why?', () => {
  it.each(TANK_EXPLANATION_IDS)('%s has formula, source, range and a verdict of this plan', async (id) => {
    const { plan, result } = await tankCase()
    const answer = explainTank(id, { plan, result })
    readXml(answer.mathml)
    for (const text of [answer.title, answer.formula, answer.source, answer.range, answer.verdict])
      expect(text.length).toBeGreaterThan(4)
    for (const { value } of answer.values) expect(Number.isFinite(value)).toBe(true)
  })

  it('says outside where a wall is too near and where a station is not reached', async () => {
    const { plan, result } = await tankCase({ tank: { length: 0.25, width: 0.2, depth: 0.5, bore: null } })
    expect(explainTank('tank.walls', { plan, result })).toMatchObject({ inside: false })
    expect(explainTank('tank.arrival', { plan, result }).verdict).toMatch(/^Outside at 1 of 3 stations/)
  })
})
