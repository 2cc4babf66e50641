import { flushPromises } from '@vue/test-utils'
import { afterEach, beforeAll, describe, expect, it } from 'vitest'
import { setWake, type Plan } from '../../../../core/plan'
import { createJetCache, run, type WakeData } from '../../../../core/run'
import { eventRows, runFacts } from '../../../../renderer/model/wakeRows'
import { sameWake } from '../../../../renderer/model/wakeJob'
import { shownUnits } from '../../../../renderer/model/units'
import { jetMeetings } from '../../../../renderer/pages/wake/jetMeetings'
import WakePage from '../../../../renderer/pages/wake/WakePage.vue'
import { planOf } from '../../../support/plans'
import { computed, makeWorkspace, mountIn } from '../../parts/mountWithWorkspace'

const UNITS = shownUnits({})
/** Coarse smoothing: words, not numbers, are looked at. */
const COARSE = { ensemble: false, coreGrowth: true, delta: 0.2 }

function jetPlan(wake: Readonly<Record<string, unknown>> = {}, nozzle: Readonly<Record<string, unknown>> = {}): Plan {
  return planOf({
    nozzle: { shape: 'tube', diameter: 0.025, pistonDiameter: 0.05, ...nozzle },
    programme: { shape: 'rectangular', stroke: 0.15, peakSpeed: 0.08 },
    jet: COARSE,
    train: { pulses: 2, period: 3 },
    wake: { start: 'jet', duration: 8, outputStep: 0.1, ageing: 'laminar', ...wake },
  })
}

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

describe('a wake from the computed jet in words', () => {
  let wake: WakeData
  let alone: WakeData
  beforeAll(async () => {
    const jetCache = createJetCache()
    const of = async (plan: Plan): Promise<WakeData> => {
      const { data, message } = await run(plan, { sections: ['wake'] }, { jetCache })
      if (data?.wake === undefined || data.wake === null) throw new Error(message)
      return data.wake
    }
    wake = await of(jetPlan({ duration: 20 }))
    alone = await of(jetPlan({ duration: 5 }))
  }, 60_000)

  it('says when the second pulse meets what the first has left, or that it does not', () => {
    const [sentence = ''] = jetMeetings(wake, UNITS)
    expect(sentence).toMatch(
      /^The ring of pulse 2 ((merges with|passes) the ring of pulse 1 at |catches no ring of an earlier)/,
    )
    expect(jetMeetings(alone, UNITS)).toEqual([
      expect.stringMatching(/^Pulse 2 has no ring yet when the run ends, at 5\s/u),
    ])
    expect(jetMeetings({ ...wake, jet: null }, UNITS)).toEqual([])
  })

  it('tells ring on ring first, with what the other law says, and only then the billow met on the way', () => {
    const each = wake.jet?.release.rings.length ?? 0
    expect(each).toBeGreaterThan(1)
    const event = (time: number, rings: readonly number[]) =>
      ({ time, event: 'merge', rings, x: 0.1 * time, detail: '' }) as const
    const events = [event(4, [2, each + 1]), event(6, [1, each + 1])]
    const march = { ...wake.wake, events, validUntil: 5 }
    const turbulent = { ...march, events: [event(4.5, [2, each + 1]), event(7, [1, each + 1])] }
    expect(
      jetMeetings({ ...wake, wake: march, turbulent }, UNITS).map((text) => text.replaceAll('\u00A0', ' ')),
    ).toEqual([
      'The ring of pulse 2 merges with the ring of pulse 1 at 6 to 7 s, x = 600 to 700 mm; the model holds only until 5 s.',
      'The ring of pulse 2 merges with a billow of pulse 1 at 4.0 to 4.5 s, x = 400 to 450 mm.',
    ])
  })

  it('says where a pulse has no ring by the end of the run', () => {
    const each = wake.jet?.release.rings.length ?? 0
    const none = { ...(wake.wake.trajectories[each] ?? wake.wake.trajectories[0]), time: new Float64Array(0) }
    const trajectories = wake.wake.trajectories.map((path, i) => (i === each ? { ...path, ...none } : path))
    const [answer = ''] = jetMeetings({ ...wake, wake: { ...wake.wake, trajectories } }, UNITS)
    expect(answer).toMatch(/^Pulse 2 has no ring yet when the run ends, at /)
  })

  it('lists pinch-offs and mergers among the events and counts the mergers', () => {
    const rows = eventRows(wake.wake, UNITS)
    expect(rows.filter(({ what }) => / pinches off$/.test(what))).toHaveLength(2)
    const mergers = rows.filter(({ what }) => /^Rings \d+ and \d+ merge$/.test(what))
    expect(mergers.length).toBeGreaterThan(0)
    expect(runFacts(wake, true, UNITS).find(({ label }) => label === 'Mergers')?.text).toBe(String(mergers.length))
  })
})

describe('what a wake from the jet depends on', () => {
  it('is the jet’s settings as well, which a matched start does not read', () => {
    const plan = jetPlan()
    const other = { ...plan, jet: { ...COARSE, delta: 0.15 } }
    expect(sameWake(plan, other)).toBe(false)
    const wake = setWake(plan, { start: 'matched' }).wake
    expect(sameWake({ ...plan, wake }, { ...other, wake })).toBe(true)
  })
})

describe('the choice on the page', () => {
  async function pageOf(plan: Plan) {
    const workspace = makeWorkspace(plan)
    workspace.page.value = 'wake'
    await computed(workspace)
    const wrapper = mountIn(workspace, WakePage)
    mounted.push(wrapper)
    const field = (label: string) => wrapper.findAll('.inputs .field').find((each) => each.text().startsWith(label))
    return { workspace, wrapper, field }
  }

  it('changes the plan as a named step, says what it means, and leaves the law to the jet', async () => {
    const { workspace, wrapper, field } = await pageOf(jetPlan({ start: 'matched', duration: 4 }))
    expect(wrapper.get('.inputs').text()).toContain('One steady ring for each pulse')
    expect(field('Law')).toBeDefined()
    await field('Start from')?.get('select').setValue('jet')
    expect(workspace.document.content.value.wake?.start).toBe('jet')
    expect(workspace.document.undoName.value).toBe('start from')
    expect(wrapper.get('.inputs').text()).toContain('pinched ring and the billows')
    expect(field('Law')).toBeUndefined()
    expect(wrapper.get('.inputs').text()).toContain('regularised, for thick cores')
  })

  it('cannot be made for several nozzles, nor for one that is not a round tube', async () => {
    const option = async (plan: Plan) =>
      (await pageOf({ ...plan, jet: null })).field('Start from')?.get('option[value=jet]')
    const nozzles = [{ position: [0, 0, 0], direction: [1, 0, 0], delay: 0 }]
    const several = await option(jetPlan({ start: 'matched', nozzles, duration: 0.5 }))
    expect(several?.attributes('disabled')).toBeDefined()
    expect(several?.text()).toContain('one nozzle only')
    const elliptic = await option(jetPlan({ start: 'matched', duration: 0.5 }, { axisRatio: 2 }))
    expect(elliptic?.text()).toContain('round tubes only')
  })

  it('begins the playback while the sheet forms, and jumps to the pinch-off', async () => {
    const { workspace, wrapper } = await pageOf(jetPlan({ duration: 4 }))
    for (let i = 0; i < 2000 && !wrapper.find('.events').exists(); i++)
      await new Promise((resolve) => setTimeout(resolve, 5))
    await flushPromises()
    const wake = workspace.wake.finished.value?.wake
    const shown = (): number => Number.parseFloat(wrapper.get('input[type=range]').attributes('aria-valuetext') ?? '')
    const release = wake?.jet?.release.time ?? NaN
    expect(Math.abs(shown() - release / 2)).toBeLessThanOrEqual(0.051)
    await wrapper
      .findAll('.events button')
      .find((each) => each.text().includes('pinches off'))
      ?.trigger('click')
    expect(Math.abs(shown() - (wake?.jet?.pinchOff?.time ?? NaN))).toBeLessThanOrEqual(0.051)
    expect(wrapper.text()).toContain('The sheet of the computed jet, cut open')
  }, 30_000)
})
