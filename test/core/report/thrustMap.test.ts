import { beforeAll, describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { examplePlan, type Plan } from '../../../core/plan'
import { fromBase } from '../../../core/quantity'
import {
  sharedArea,
  textWidth,
  thrustMap,
  thrustMapDrawing,
  thrustMapToCsv,
  thrustMapToSvg,
  type MapResult,
  type ThrustMapModel,
} from '../../../core/report'
import { createJetCache, thrusterMap, type ThrusterMap, type ThrusterMapRequest } from '../../../core/run'
import { expectClose } from '../../support/close'
import { readXml, textsOf } from './xml'

const UNITS = { length: 'mm', frequency: 'Hz', power: 'W', force: 'mN', speed: 'm/s' }

function mapOf(plan: Plan, pulsing: ThrusterMapRequest['pulsing'], count = 40): ThrusterMap {
  const search = plan.thruster?.search
  if (search === undefined || search === null) throw new Error('the example has no search')
  const made = thrusterMap(
    plan,
    {
      x: { field: 'diameter', span: search.diameter },
      y: { field: 'strokeRatio', span: search.strokeRatio },
      count,
      pulsing,
    },
    createJetCache(),
  )
  if (made.status !== 'done') throw new Error(made.message)
  return made
}

function modelOf(made: ThrusterMap, result: MapResult = 'power', more: Partial<Parameters<typeof thrustMap>[0]> = {}) {
  const { map, present } = made
  return thrustMap({
    map,
    present,
    result,
    units: UNITS,
    candidates: [],
    published: [3.6, 4.5],
    underWay: false,
    ...more,
  })
}

const PLAN = examplePlan('survey-vehicle')

describe('the map of a thruster', () => {
  let made: ThrusterMap
  let model: ThrustMapModel
  beforeAll(() => {
    made = mapOf(PLAN, 'asked')
    model = modelOf(made)
  })

  it('holds the values of core in the shown units', () => {
    expect(model.x.unit).toBe('mm')
    expect(model.grid.x[0]).toBeCloseTo(30, 9)
    const cell = 17 * made.map.x.length + 5
    expect(at(model.grid.values, cell)).toBe(at(made.map.power, cell))
    const thrust = modelOf(made, 'thrust')
    expectClose(at(thrust.grid.values, cell), fromBase(at(made.map.thrust, cell), 'mN'), 1e-15)
  })

  it('draws a line of its own value for every number on the scale', () => {
    expect(model.contours.length).toBeGreaterThan(2)
    for (const { level, label, lines } of model.contours) {
      expect(label).not.toBe('')
      expect(model.result.low).toBeLessThanOrEqual(level)
      expect(model.result.high).toBeGreaterThanOrEqual(level)
      expect(lines.length).toBeGreaterThan(0)
    }
  })

  it('has an edge for each limit that bounds what is feasible, with the room on its left', () => {
    expect(model.feasibleShare).toBeGreaterThan(0.1)
    expect(model.edges.map(({ name }) => name)).toContain('bay diameter')
    const bay = model.edges.find(({ name }) => name === 'bay diameter')
    // The plunger is twice the exit: the bay of 150 mm ends at 75 mm, whatever the stroke.
    for (const { x } of bay?.lines.flat() ?? []) expect(x).toBeCloseTo(75, 6)
    const [line] = bay?.lines ?? []
    // Smaller exits have room; with them on the left the line runs upward.
    expect((line?.at(-1)?.y ?? 0) - (line?.[0]?.y ?? 0)).toBeGreaterThan(0)
  })

  it('shows the published band along the stroke ratio only, and marks the plan and the candidates', () => {
    expect(model.strips).toEqual([{ axis: 'y', from: 3.6, to: 4.5, label: 'published pinch-off band' }])
    const [here] = model.marks
    expect([here?.kind, here?.x, here?.y]).toEqual(['present', 50, 4])
    const candidates = [
      { ...made.present, diameter: 0.04 },
      { ...made.present, count: 4 },
    ]
    const marked = modelOf(made, 'power', { candidates }).marks
    expect(marked.map(({ label, onMap }) => [label, onMap])).toEqual([
      ['1', true],
      ['2', false],
      ['this plan', true],
    ])
  })

  it('names its number of thrusters, and those of candidates that lie elsewhere', () => {
    const several = [3, 2, 3].map((count) => ({ ...made.present, count }))
    expect(model.standing).toBe(`For ${made.present.count} thrusters, as planned.`)
    expect(modelOf(made, 'power', { candidates: several.map((design) => ({ ...design, count: 7 })) }).standing).toBe(
      `For ${made.present.count} thrusters, as planned. Dashed candidates are for 7 thrusters: they lie on another map.`,
    )
    const none = { ...made, map: { ...made.map, feasible: made.map.feasible.map(() => 0) } }
    const alone = { ...made.present, count: 1 }
    expect(modelOf(none, 'power', { present: alone, candidates: several }).standing).toBe(
      'No choice on this map, for 1 thruster, as planned, holds every limit. ' +
        'Dashed candidates are for 2 or 3 thrusters: they lie on another map.',
    )
  })

  it('spans its colours by what holds every limit, and leaves the extremes out where nothing does', () => {
    const held = made.map.power.filter((_, cell) => at(made.map.feasible, cell) === 1)
    expect([model.result.low, model.result.high]).toEqual([Math.min(...held), Math.max(...held)])
    const cells = made.map.power.length
    // One choice in a hundred takes a million watts: the others keep their colours.
    const map = {
      ...made.map,
      power: made.map.power.map((_, cell) => (cell % 100 === 0 ? 1e6 : 1 + cell / cells)),
      feasible: made.map.feasible.map(() => 0),
      rooms: new Map([['thrust' as const, made.map.power.map(() => -1)]]),
    }
    const { result, weak } = modelOf({ ...made, map })
    expect(result.low).toBeGreaterThan(1)
    expect(result.high).toBeLessThan(2.01)
    expect(result.beyondHigh).toBe(true)
    expect(weak.length).toBeGreaterThan(0)
  })

  it('colours by powers of ten where values span them', () => {
    const map = { ...made.map, power: made.map.power.map((_, i) => 10 ** ((4 * i) / made.map.power.length)) }
    const { result } = thrustMap({
      map,
      present: made.present,
      result: 'power',
      units: UNITS,
      candidates: [],
      published: null,
      underWay: false,
    })
    expect(result.logarithmic).toBe(true)
    for (const level of result.levels) expect(Number(level.toExponential().split('e')[0])).toBeOneOf([1, 2, 5])
  })

  it('places no two labels on one another and none beyond the frame', () => {
    for (const [width, height] of [
      [820, 420],
      [560, 300],
      [1300, 700],
    ] as const) {
      const drawing = thrustMapDrawing(model, { width, height, font: 12, measure: (text) => textWidth(text, 12) })
      const plates = drawing.texts.flatMap(({ plate }) => (plate === null ? [] : [plate]))
      expect(plates.length).toBeGreaterThan(3)
      plates.forEach((plate, i) => {
        for (const other of plates.slice(i + 1)) expect(sharedArea(plate, other)).toBeLessThan(1)
        expect(plate.left).toBeGreaterThanOrEqual(drawing.frame.left - 1)
        expect(plate.left + plate.width).toBeLessThanOrEqual(drawing.frame.left + drawing.frame.width + 1)
      })
    }
  })

  it('moves candidates that stand in one place apart, each tied to it', () => {
    const candidates = Array.from({ length: 4 }, () => ({ ...made.present }))
    const drawing = thrustMapDrawing(modelOf(made, 'power', { candidates }), {
      width: 820,
      height: 420,
      font: 12,
      measure: (text) => textWidth(text, 12),
    })
    const { marks } = drawing
    expect(marks).toHaveLength(5)
    marks.forEach((mark, i) => {
      for (const other of marks.slice(i + 1)) expect(Math.hypot(mark.x - other.x, mark.y - other.y)).toBeGreaterThan(18)
    })
    expect(marks.filter(({ tie }) => tie !== '')).toHaveLength(4)
  })

  it('finds the place under a pixel again', () => {
    const drawing = thrustMapDrawing(model, { width: 700, height: 400, font: 12, measure: () => 20 })
    const place = drawing.toPlace({ x: drawing.toX(47), y: drawing.toY(3.3) })
    expectClose(place.x, 47, 1e-12)
    expectClose(place.y, 3.3, 1e-12)
  })

  it('writes well-formed SVG with every limit by name, and a row of CSV for every choice', () => {
    const svg = readXml(thrustMapToSvg(model, { width: 820, height: 520, theme: 'print' }))
    const texts = textsOf(svg).map(({ text }) => text)
    for (const { name } of model.edges) expect(texts).toContain(name)
    expect(texts).toContain('Total power (W)')
    const lines = thrustMapToCsv(model).trimEnd().split('\r\n')
    expect(lines[0]).toBe('Exit diameter (mm),Stroke ratio,Total power (W),feasible,limit')
    expect(lines).toHaveLength(1 + 40 * 40)
    expect(lines.join()).not.toMatch(/NaN|Infinity/)
  })

  it('says so and shows every limit whole where nothing holds them all', () => {
    const small = { ...PLAN, thruster: PLAN.thruster && { ...PLAN.thruster, bay: { length: null, diameter: 0.02 } } }
    const none = modelOf(mapOf(small, 'asked', 20))
    expect(none.feasibleShare).toBe(0)
    expect(none.limits[0]).toBe('bay diameter')
    expect(none.edges.map(({ name }) => name)).toContain('plunger travel')
  })

  it('is that of the plan itself where it stands, pulsing as planned', () => {
    const planned = mapOf(PLAN, 'planned', 9)
    // 30 to 90 mm and 2 to 6 in nine places each: the plan's 50 mm lies between two, its stroke ratio of 4 on the fifth.
    const fine = thrusterMap(
      PLAN,
      {
        x: { field: 'diameter', span: [0.05, 0.06] },
        y: { field: 'strokeRatio', span: [4, 5] },
        count: 2,
        pulsing: 'planned',
      },
      createJetCache(),
    )
    if (fine.status !== 'done') throw new Error(fine.message)
    expect(planned.present.frequency).toBeCloseTo(1 / 0.45, 12)
    expect(at(fine.map.frequency, 0)).toBeCloseTo(1 / 0.45, 12)
  })
})
