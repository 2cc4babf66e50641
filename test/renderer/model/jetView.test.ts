import { beforeAll, describe, expect, it } from 'vitest'
import { computed, nextTick, shallowRef } from 'vue'
import { at } from '../../../core/base'
import { defaultPlan, setField, setJet, type Plan } from '../../../core/plan'
import { run } from '../../../core/run'
import { jetExportItems, plotsOf } from '../../../renderer/model/jetExports'
import type { FinishedJet, JetJob } from '../../../renderer/model/jetJob'
import {
  jetDeltaNote,
  jetDeltaRows,
  jetFigures,
  jetFurtherRows,
  jetRows,
  momentText,
  placeInWords,
  shareOf,
} from '../../../renderer/model/jetRows'
import { estimateRows } from '../../../renderer/model/resultRows'
import { createJetView, shapeAt } from '../../../renderer/model/jetView'
import { shownUnits } from '../../../renderer/model/units'

const UNITS = shownUnits({ time: 's' })

async function finishedOf(plan: Plan): Promise<FinishedJet> {
  const { data } = await run(plan, { sections: ['pulse', 'jet'] })
  if (data?.jet == null) throw new Error('no jet')
  return { plan, data, jet: data.jet, pulse: data.pulse, partial: null }
}

let long: FinishedJet
let short: FinishedJet

beforeAll(async () => {
  const plan = setJet(defaultPlan(), { ensemble: false, delta: 0.15 })
  long = await finishedOf(setField(plan, 'programme.stroke', 8 * plan.nozzle.diameter))
  short = await finishedOf(setField(plan, 'programme.stroke', 2 * plan.nozzle.diameter))
})

function viewOf(first: FinishedJet | null) {
  const held = shallowRef(first)
  const job: JetJob = {
    finished: computed(() => held.value),
    status: computed(() => 'current' as const),
    progress: shallowRef(null),
    failure: computed(() => null),
    run: () => undefined,
    cancel: () => undefined,
  }
  return {
    view: createJetView(
      job,
      () => UNITS,
      () => () => undefined,
    ),
    held,
  }
}

describe('the view of a jet', () => {
  it('stands at pinch-off when a jet that pinches off has been run, and at the stop of one that does not', async () => {
    const { view, held } = viewOf(null)
    expect(view.place.value).toBeNull()
    held.value = long
    await nextTick()
    const pinched = view.model.value?.timeline.moments.find(({ id }) => id === 'pinch-off')
    expect(pinched).toBeDefined()
    expect(view.place.value ?? 0).toBeGreaterThanOrEqual((pinched?.place ?? Infinity) - 1e-9)
    held.value = short
    await nextTick()
    expect(view.place.value ?? 0).toBeGreaterThanOrEqual(2)
    expect(view.place.value ?? 0).toBeLessThan(2.3)
  })

  it('finds the shape nearest to a place on the ruler, held to its ends', async () => {
    const { view, held } = viewOf(null)
    held.value = long
    await nextTick()
    view.seekPlace(3.1)
    // Shapes stand at most a quarter apart.
    expect(Math.abs((view.place.value ?? 0) - 3.1)).toBeLessThanOrEqual(0.126)
    view.seekPlace(99)
    expect(view.playback.index.value).toBe(view.playback.count.value - 1)
    view.seekPlace(-1)
    expect(view.playback.index.value).toBe(0)
  })
})

describe('shapeAt', () => {
  it('is the first shape at or after a time, else the last', () => {
    expect(shapeAt([1, 2, 3], 2)).toBe(1)
    expect(shapeAt([1, 2, 3], 2.1)).toBe(2)
    expect(shapeAt([1, 2, 3], 9)).toBe(2)
  })
})

describe('the rows of a jet', () => {
  it('show the formation number with one decimal, and no range where there is one smoothing length', () => {
    const row = at(jetRows(long, UNITS), 0)
    expect(row.figure).toBe(long.jet.formation?.formationNumber?.toFixed(1))
    expect(row.notes).toEqual(['one smoothing length: no range'])
  })

  it('show the range large and the mean small where there are several', () => {
    const { formation } = long.jet
    if (formation === null) throw new Error('no formation')
    const one = at(formation.byDelta, 0)
    const ranged = {
      ...formation,
      byDelta: [one, one, one],
      formationNumber: 4.12,
      formationNumberLow: 3.86,
      formationNumberHigh: 4.51,
    }
    const row = at(jetRows({ ...long, jet: { ...long.jet, formation: ranged } }, UNITS), 0)
    expect(row.figure).toBe('3.9 to 4.5')
    expect(row.notes).toEqual(['mean 4.1 of 3 smoothing lengths'])
  })

  it('stand among the estimates of the formation number, where there is one', () => {
    const { plan, pulse } = long
    if (pulse === null) throw new Error('no pulse')
    const found = estimateRows(plan, pulse, long.jet.formation).find(({ id }) => id === 'jet.formationNumber')
    expect(found).toMatchObject({ label: 'Computed jet', value: long.jet.formation?.formationNumber?.toFixed(1) })
    expect(estimateRows(plan, pulse).some(({ id }) => id === 'jet.formationNumber')).toBe(false)
  })

  it('say that one ring takes everything, or that a jet follows', () => {
    const notes = (finished: FinishedJet) => jetRows(finished, UNITS).flatMap((row) => row.notes)
    expect(notes(long)).toContain('a trailing jet follows the ring')
    expect(notes(short)).toContain('one ring takes everything')
  })

  it('have a member for each smoothing length, and how the run went', () => {
    expect(jetDeltaRows(long, UNITS).map(({ delta }) => delta)).toEqual(['0.15'])
    expect(jetFurtherRows(long, UNITS).map(({ id }) => id)).toEqual(['jet.stoppingVortex', 'jet.drift'])
  })

  it('say which stroke the formation number of each is read from, where it is not the plan’s own', () => {
    expect(jetDeltaNote(long)).toBeNull()
    const formation = long.jet.own
    expect(jetDeltaNote({ ...short, jet: { ...short.jet, formation } })).toMatch(
      /^Formation number: from a stroke of 8 D\..* from the plan's own, 2\.00 D\.$/,
    )
  })

  it('give the numbers of the shape shown in the chosen units, and a dash before a ring is cut', async () => {
    const { view, held } = viewOf(null)
    held.value = long
    await nextTick()
    const model = view.model.value
    if (model === null) throw new Error('no model')
    const first = new Map(jetFigures(long, model, 0, UNITS).map(({ label, text }) => [label, text]))
    expect(first.get('State')).toBe('forming')
    expect(first.get('In the ring')).toBe('—')
    const end = new Map(jetFigures(long, model, model.shapes.length - 1, UNITS).map(({ label, text }) => [label, text]))
    // The ruler's mark goes on after the stroke; formation time does not.
    const place = at(model.timeline.places, model.shapes.length - 1)
    expect(place).toBeGreaterThan(8.1)
    expect(end.get('Formation time')).toBe(`8.00, on to ${place.toFixed(1)}`)
    expect(placeInWords(model, model.shapes.length - 1, 's')).toContain(`8.00, run on to ${place.toFixed(1)}`)
    expect(end.get('Ring radius')).toMatch(/mm$/)
    expect(jetFigures(long, model, 9999, UNITS)).toEqual([])
  })

  it('put places along the slider and beside the moments of the stroke', () => {
    expect(shareOf([2, 3, 6], 4)).toBe(0.5)
    expect(shareOf([2], 4)).toBe(0)
    expect(momentText('ring full', 4.08, 8)).toBe('ring full, 4.1')
    expect(momentText('pinch-off', 9.4, 8)).toBe('pinch-off')
  })
})

describe('the exports of a jet', () => {
  it('are its table, its section at the time shown, and its plots', async () => {
    const { view, held } = viewOf(null)
    held.value = long
    await nextTick()
    const model = view.model.value
    if (model === null) throw new Error('no model')
    const items = jetExportItems(long.plan, long, model, 3, UNITS)
    expect(items.map(({ id }) => id)).toEqual([
      'jet',
      'jet-section',
      ...plotsOf(long, model, UNITS).map(({ id }) => id),
    ])
    const table = await at(at(items, 0).formats, 0).make()
    expect(String(table)).toMatch(/^formation time,time \(s\),total circulation/)
    expect(String(await at(at(items, 1).formats, 0).make())).toContain('<svg')
    expect(at(at(items, 1).formats, 0).name).toMatch(/jet-at-[\d.]+ s\.svg$/)
  })
})
