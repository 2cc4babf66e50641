import { flushPromises } from '@vue/test-utils'
import { afterEach, describe, expect, it } from 'vitest'
import { nextTick } from 'vue'
import { defaultPlan, examplePlan, setThruster, setTrain, type Plan } from '../../../../core/plan'
import StockField from '../../../../renderer/pages/thrust/StockField.vue'
import ThrustPage from '../../../../renderer/pages/thrust/ThrustPage.vue'
import ExportDialog from '../../../../renderer/parts/dialogs/ExportDialog.vue'
import { computed, fakeHost, makeWorkspace, mountIn } from '../../parts/mountWithWorkspace'

const mounted: { unmount(): void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
})

const SURVEY = examplePlan('survey-vehicle')

async function pageOf(plan: Plan = SURVEY, host = fakeHost()) {
  const workspace = makeWorkspace(plan, host)
  workspace.page.value = 'thrust'
  await computed(workspace)
  const settle = async (): Promise<void> => {
    for (let i = 0; i < 200 && workspace.thrust.quick.status.value === 'running'; i++)
      await new Promise((resolve) => setTimeout(resolve, 5))
    await flushPromises()
    await nextTick()
  }
  await settle()
  const wrapper = mountIn(workspace, ThrustPage)
  mounted.push(wrapper)
  await settle()
  const button = (name: string | RegExp) => {
    const found = wrapper.findAll('button').find((each) => {
      const words = each.attributes('aria-label') ?? each.text()
      return typeof name === 'string' ? words === name : name.test(words)
    })
    if (found === undefined) throw new Error(`no button ${name}`)
    return found
  }
  const field = (label: string) => {
    const found = wrapper.findAll('label').find((each) => each.text() === label)
    if (found === undefined) throw new Error(`no field ${label}`)
    return wrapper.get(`[id="${found.attributes('for')}"]`)
  }
  return { wrapper, workspace, button, field, settle, plan: () => workspace.document.content.value }
}

describe('a list of sizes in stock', () => {
  it('is counted among the entries not taken while it is refused', async () => {
    const workspace = makeWorkspace(SURVEY)
    const wrapper = mountIn(workspace, StockField, { label: 'Bores', sizes: [0.02], unit: 'mm' })
    mounted.push(wrapper)
    const input = wrapper.get('input')
    await input.setValue('20; 5 mL')
    await input.trigger('keydown', { key: 'Enter' })
    expect(wrapper.text()).toContain('is a volume')
    expect(workspace.untaken.count.value).toBe(1)
    await input.trigger('keydown', { key: 'Escape' })
    expect(workspace.untaken.count.value).toBe(0)
  })
})

describe('a list of sizes in stock', () => {
  it('refuses what is no size in place and keeps the text', async () => {
    const workspace = makeWorkspace(SURVEY)
    const wrapper = mountIn(workspace, StockField, { label: 'Bores', sizes: [0.02], unit: 'mm' })
    mounted.push(wrapper)
    const input = wrapper.get('input')
    await input.setValue('30; 40; abc')
    await input.trigger('blur')
    expect(wrapper.get('.refusal').text()).toContain('abc')
    expect(input.element.value).toBe('30; 40; abc')
    expect(wrapper.emitted('commit')).toBeUndefined()
  })
})

describe('a limit that is not given', () => {
  it('shows its unit and reads a bare number in it, however small the results are', async () => {
    // A bench of millinewtons and microwatts: what the results are shown in must not be what a limit is read in.
    const { field, plan, settle, workspace } = await pageOf(
      setThruster({ ...SURVEY, train: { pulses: 10, period: 2000 } }, { vehicle: null, target: [] }),
    )
    expect(workspace.units.value.force).not.toBe('N')
    for (const [label, unit] of [
      ['Largest force', 'N'],
      ['Largest power', 'W'],
    ] as const) {
      await field(label).setValue('')
      await field(label).trigger('blur')
      await settle()
      expect(field(label).attributes('placeholder')).toBe(`not given, ${unit}`)
      await field(label).setValue('400')
      await field(label).trigger('blur')
      await settle()
    }
    expect(plan().thruster?.actuator.maxForce).toBe(400)
    expect(plan().thruster?.actuator.maxPower).toBe(400)
  })
})

describe('the Thrust page', () => {
  it('offers a vehicle, a bench and examples where the plan has no thruster, each one step', async () => {
    const { button, workspace, plan, settle, wrapper } = await pageOf(defaultPlan())
    await button('Clamp it on a bench').trigger('click')
    expect(plan().thruster?.vehicle).toBeNull()
    expect(workspace.document.undoName.value).toBe('thruster')
    workspace.document.undo()
    await nextTick()
    await button('Put it on a vehicle').trigger('click')
    await settle()
    expect(plan().thruster?.vehicle?.drag?.kind).toBe('area')
    expect(wrapper.text()).toContain('Mean thrust')
    expect(wrapper.text()).not.toMatch(/NaN|Infinity|undefined/)
  })

  it('asks for the period in place where there is none', async () => {
    const { wrapper, field, plan, settle } = await pageOf(setTrain(SURVEY, null))
    expect(wrapper.text()).toContain('How often does it pulse?')
    await field('From pulse to pulse').setValue('0.5 s')
    await field('From pulse to pulse').trigger('blur')
    await settle()
    expect(plan().train?.period).toBe(0.5)
    expect(wrapper.find('svg.thrust-map').exists()).toBe(true)
  })

  it('draws the map with the plan on it, and moves the plan by arrows as one step', async () => {
    const { wrapper, workspace, plan, settle } = await pageOf()
    const handle = wrapper.get('[role=slider]')
    expect(handle.attributes('aria-valuetext')).toMatch(/^Exit diameter 50 mm, Stroke ratio 4 ; Total power/)
    for (let i = 0; i < 3; i++) await handle.trigger('keydown', { key: 'ArrowRight' })
    await handle.trigger('keydown', { key: 'ArrowUp', shiftKey: true })
    await settle()
    // A hundredth of 30 to 90 mm is 1 mm, a tenth of 2 to 6 is 0.5 on the 1-2-5 ladder.
    expect(plan().nozzle.diameter).toBeCloseTo(0.053, 12)
    expect(plan().programme.stroke / plan().nozzle.diameter).toBeCloseTo(4.5, 12)
    expect(plan().nozzle.pistonDiameter).toBeCloseTo(0.106, 12)
    workspace.document.undo()
    expect(plan().nozzle.diameter).toBe(0.05)
    expect(workspace.document.undoName.value).toBeNull()
  })

  it('sizes, opens a candidate as one step and takes it back', async () => {
    const { wrapper, workspace, button, plan, settle } = await pageOf()
    await button('Size').trigger('click')
    for (let i = 0; i < 4000 && workspace.thrust.sizing.status.value === 'running'; i++)
      await new Promise((resolve) => setTimeout(resolve, 5))
    await settle()
    expect(button(/^Candidates/).attributes('aria-pressed')).toBe('true')
    const heads = wrapper.findAll('th[aria-sort]')
    expect(heads[0]?.attributes('aria-sort')).toBe('ascending')
    await button(/^Power \(/).trigger('click')
    await button(/^Power \(/).trigger('click')
    expect(wrapper.findAll('th[aria-sort]')[1]?.attributes('aria-sort')).toBe('descending')
    const before = plan()
    const candidate = workspace.thrust.sizing.finished.value?.sizing.candidates[1]
    await button('Open candidate 2').trigger('click')
    expect(plan().nozzle.diameter).toBe(candidate?.design.diameter)
    expect(plan().thruster?.count).toBe(candidate?.design.count)
    expect(workspace.document.undoName.value).toBe('open candidate 2')
    expect(workspace.thrust.sizing.status.value).toBe('current')
    workspace.document.undo()
    expect(plan()).toBe(before)
  }, 60_000)

  it('holds a design and tells the differences of the next one', async () => {
    const { wrapper, workspace, button, field, settle, plan } = await pageOf()
    await button('Hold this design').trigger('click')
    expect(plan().held).toHaveLength(1)
    expect(workspace.document.undoName.value).toBe('hold Held 1')
    await settle()
    await field('Efficiency').setValue('0.35')
    await field('Efficiency').trigger('blur')
    await settle()
    // Half the efficiency takes twice the power for the same thrust.
    expect(wrapper.text()).toMatch(/Held 1: 3\.94 W; here \+100 %/)
    expect(wrapper.text()).toMatch(/Held 1: 1\.38 N; here the same/)
    await button('Bring back').trigger('click')
    expect(plan().thruster?.actuator.efficiency).toBe(0.7)
    expect(plan().held).toHaveLength(1)
  })

  it('takes a table of drag from pasted cells and names the rows it skipped', async () => {
    const vehicle = SURVEY.thruster?.vehicle
    if (vehicle === undefined || vehicle === null) throw new Error('no vehicle')
    const rows = [
      { speed: 0, drag: 0 },
      { speed: 1, drag: 5 },
    ]
    const { wrapper, button, plan, settle } = await pageOf(
      setThruster(SURVEY, { vehicle: { ...vehicle, drag: { kind: 'table', rows } } }),
    )
    await wrapper.get('[role=grid]').trigger('paste', {
      clipboardData: { getData: () => 'speed (m/s)\tdrag (N)\n0.4\t0.7\n0.6\tmuch\n1\t3.6\n' },
    })
    await settle()
    expect(wrapper.text()).toContain('2 rows read from the clipboard; 1 of 3 skipped:')
    expect(wrapper.text()).toContain('Line 3:')
    await button('Take these rows').trigger('click')
    expect(plan().thruster?.vehicle?.drag).toEqual({
      kind: 'table',
      rows: [
        { speed: 0.4, drag: 0.7 },
        { speed: 1, drag: 3.6 },
      ],
    })
  })

  it('tells a period too short in place, keeps the old results and says so', async () => {
    const { wrapper, field, settle } = await pageOf()
    await field('Period').setValue('0.2 s')
    await field('Period').trigger('blur')
    await settle()
    expect(wrapper.text()).toMatch(/Period must be above the stroke's 0\.19635 s/)
    expect(wrapper.text()).toContain('The results below are for the plan before this change.')
    expect(wrapper.text()).toContain('Mean thrust')
  })

  it('exports map and plots', async () => {
    const host = fakeHost()
    const { workspace } = await pageOf(SURVEY, host)
    const dialog = mountIn(workspace, ExportDialog)
    mounted.push(dialog)
    await flushPromises()
    expect(dialog.findAll('strong')[0]?.text()).toMatch(/^Map: total power over exit diameter and stroke ratio/)
    const csv = dialog.findAll('button').find((each) => /^Map.* as CSV$/.test(each.attributes('aria-label') ?? ''))
    await csv?.trigger('click')
    await flushPromises()
    expect(host.exports[0]?.name).toBe('survey-vehicle-two-thrusters-map.csv')
    expect(String(host.exports[0]?.content)).toMatch(/^Exit diameter \(mm\),Stroke ratio,Total power \(W\)/)
  })
})
