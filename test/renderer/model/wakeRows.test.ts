import { beforeAll, describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { defaultPlan, setChoice, setField, setTrain, setWake, type Plan } from '../../../core/plan'
import { run, type WakeData } from '../../../core/run'
import { catchInWords } from '../../../renderer/model/wakeCatch'
import { arrivalRows, clockText, eventRows, ringFigures, runFacts } from '../../../renderer/model/wakeRows'
import { shownUnits } from '../../../renderer/model/units'

const UNITS = shownUnits({})
const RING = {
  circulation: 0.01,
  radius: 0.02,
  coreRadius: 0.002,
  core: 'uniform',
  centre: [0, 0, 0],
  direction: [1, 0, 0],
} as const

async function wakeOf(plan: Plan): Promise<WakeData> {
  const { data, message } = await run(plan, { sections: ['wake'] })
  if (data === null || data.wake === null) throw new Error(message)
  return data.wake
}

function plain(text: string): string {
  return text.replaceAll('\u00A0', ' ')
}

/** Leapfrogging pair of rings; the first starts behind. */
const PAIR = setWake(defaultPlan(), {
  rings: [RING, { ...RING, centre: [0.02, 0, 0] }],
  duration: 1.2,
  viscous: false,
  stations: [0.05],
})

describe('rows of a wake', () => {
  let pair: WakeData
  beforeAll(async () => {
    pair = await wakeOf(PAIR)
  })

  it('tell every event with its time, rings and place', () => {
    const rows = eventRows(pair.wake, UNITS)
    expect(rows).toHaveLength(pair.wake.events.length)
    const pass = rows.find(({ what }) => what === 'Rings 1 and 2 pass')
    expect(plain(pass?.place ?? '')).toMatch(/^x = [\d.]+ mm$/)
    const arrival = rows.find(({ what }) => / arrives$/.test(what))
    expect(plain(arrival?.detail ?? '')).toBe('station 50 mm')
    expect(rows.at(-1)?.what).toBe('End of the run')
    expect(rows.some(({ beyond }) => beyond)).toBe(false)
  })

  it('mark events after the time up to which the model holds', () => {
    const validUntil = at(pair.wake.events, 1).time
    const rows = eventRows({ ...pair.wake, validUntil }, UNITS)
    expect(rows.map(({ beyond }) => beyond)).toEqual(rows.map(({ time }) => time > validUntil))
    expect(rows.filter(({ beyond }) => beyond).length).toBeGreaterThan(0)
    expect(at(rows, 1).beyond).toBe(false)
    for (const { beyond, detail } of rows) expect(detail.startsWith('after “holds until”')).toBe(beyond)
  })

  it('give the picked ring’s own numbers at the time shown', () => {
    const figures = ringFigures(pair.wake, 2, 0, 1e-6, UNITS)
    const figure = (id: string) => figures?.find((row) => row.id === id)
    expect(figure('circulation')).toMatchObject({ figure: '100', unit: 'cm²/s' })
    expect(figure('radius')).toMatchObject({ figure: '20', unit: 'mm' })
    expect(figure('core')?.note).toBe('0.1 of the radius')
    expect(figure('place')?.figure).toBe('20, 0, 0')
    expect(figure('direction')?.figure).toBe('1, 0, 0')
    expect(figure('reynolds')?.figure).toBe('10000')
    expect(ringFigures(pair.wake, 3, 0, 1e-6, UNITS)).toBeNull()
  })

  it('say how the rings were marched, and the drift where there is one', () => {
    const facts = new Map(runFacts(pair, false, UNITS).map(({ label, text }) => [label, plain(text)]))
    expect(facts.get('Engine')).toMatch(/^Rings on one axis\./)
    expect(facts.get('Ageing')).toBe('none: without viscosity')
    expect(facts.get('Drift')).toMatch(/impulse .*energy /)
    expect(Number(facts.get('Passes'))).toBe(pair.wake.events.filter(({ event }) => event === 'pass').length)
  })

  it('give arrivals as a range where both ageing laws apply', async () => {
    // Ring Reynolds number 5000 in water at 20 degrees: between the laminar and the turbulent range.
    const plan = setWake(defaultPlan(), {
      rings: [{ ...RING, circulation: 0.005 }],
      duration: 4,
      stations: [0.1],
    })
    const data = await wakeOf(plan)
    expect(data.turbulent).not.toBeNull()
    const [arrival] = arrivalRows(data.arrivals, UNITS)
    expect(plain(arrival?.timeText ?? '')).toMatch(/^[\d.]+ to [\d.]+ s$/)
    expect(runFacts(data, true, UNITS).find(({ label }) => label === 'Ageing')?.text).toMatch(/turbulent run as well/)
  })

  it('leave the range of an arrival open where the other law’s run ended before it', () => {
    const arrival = { station: 0.1, ring: 1, time: 4.85, timeLow: 4.85, timeHigh: null, open: true }
    expect(plain(arrivalRows([arrival], UNITS)[0]?.timeText ?? '')).toBe('4.85 s or later')
  })

  it('do not tell a drift of sums that are not conserved', async () => {
    const data = await wakeOf(setWake(PAIR, { viscous: true, ageing: 'laminar', duration: 0.1 }))
    expect(runFacts(data, true, UNITS).find(({ label }) => label === 'Drift')?.text).toMatch(/^not told/)
  })
})

describe('does one pulse catch the other', () => {
  it('names the ring that comes from behind, whatever its number', async () => {
    const answer = catchInWords((await wakeOf(PAIR)).wake, 2, 'Ring', UNITS).map(plain)
    expect(answer).toHaveLength(1)
    expect(answer[0]).toMatch(/^Ring 1 catches and passes ring 2 at [\d.]+ s, x = [\d.]+ mm\.$/)
  })

  it('says how the gap goes where none is caught', async () => {
    const train = setTrain(setWake(defaultPlan(), { duration: 8 }), { pulses: 3, period: 3 })
    const answer = catchInWords((await wakeOf(train)).wake, 3, 'Pulse', UNITS).map(plain)
    expect(answer).toHaveLength(2)
    expect(answer[0]).toMatch(/^Pulse 2 does not catch pulse 1 within 8 s: the gap (is|stays) /)
  })

  it('sums up a long train in which nobody is caught', async () => {
    const train = setTrain(setWake(defaultPlan(), { duration: 40, tolerance: 1e-6 }), { pulses: 8, period: 4 })
    const answer = catchInWords((await wakeOf(train)).wake, 8, 'Pulse', UNITS).map(plain)
    expect(answer).toEqual(['No pulse catches the one before it within 40 s.'])
  })

  it('says that rings that face one another meet', async () => {
    const rings = [RING, { ...RING, centre: [0.2, 0, 0], direction: [-1, 0, 0] } as const]
    const answer = catchInWords((await wakeOf(setWake(PAIR, { rings, duration: 0.5 }))).wake, 2, 'Ring', UNITS)
    expect(plain(at(answer, 0))).toMatch(
      /^Ring 1 and ring 2 do not meet within 0\.5 s: the gap is closing, from 200 mm to /,
    )
  })

  it('does not call a sideways distance a gap', async () => {
    const rings = [RING, { ...RING, centre: [0, 0.1, 0] } as const]
    const beside = setWake(PAIR, { rings, duration: 0.2, law: 'regularised', tolerance: 1e-3 })
    expect(catchInWords((await wakeOf(beside)).wake, 2, 'Ring', UNITS)).toEqual([
      'Ring 1 and ring 2 run side by side: neither is in the other’s way.',
    ])
  })

  it('says so where the model does not hold from the start', async () => {
    const { wake } = await wakeOf(PAIR)
    const [answer = ''] = catchInWords({ ...wake, validUntil: 1.02e-16 }, 2, 'Ring', UNITS)
    expect(answer).toMatch(/; the model does not hold from the start\.$/)
  })

  it('tells nozzles apart', async () => {
    const train = setTrain(
      setWake(setField(setChoice(defaultPlan(), 'wake.law', 'regularised'), 'wake.tolerance', 1e-3), {
        duration: 2.4,
        nozzles: [
          { position: [0, 0, 0], direction: [1, 0, 0], delay: 0 },
          { position: [0, 0.3, 0], direction: [1, 0, 0], delay: 0 },
        ],
      }),
      { pulses: 2, period: 1.4 },
    )
    const answer = catchInWords((await wakeOf(train)).wake, 2, 'Pulse', UNITS)
    expect(answer.map((sentence) => sentence.slice(0, 55))).toEqual([
      'Pulse 2 of nozzle 1 does not catch pulse 1 of nozzle 1 ',
      'Pulse 2 of nozzle 2 does not catch pulse 1 of nozzle 2 ',
    ])
  })
})

describe('words of times', () => {
  it('a running clock has the decimals of its step', () => {
    expect(plain(clockText(0.5, 0.05, 's'))).toBe('0.50 s')
    expect(plain(clockText(12, 1, 's'))).toBe('12 s')
    expect(plain(clockText(1.5e7, 1e5, 's'))).toBe('1.5×10⁷ s')
    expect(plain(clockText(2.5e-9, 1e-10, 's'))).toBe('2.5×10⁻⁹ s')
    expect(plain(clockText(0.0125, 0.0005, 'ms'))).toBe('12.5 ms')
  })
})
