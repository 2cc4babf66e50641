import { describe, expect, it } from 'vitest'
import { examplePlan, readPlan, setStrokeRatio, writePlan } from '../../../core/plan'
import { fakeHost, makeWorkspace } from '../parts/mountWithWorkspace'

const settle = () => new Promise((resolve) => setTimeout(resolve, 0))

describe('files', () => {
  it('saves what is open, keeps the file, and clears the edited mark', async () => {
    const host = fakeHost()
    const { document, files } = makeWorkspace(examplePlan('inspection-thruster'), host)
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    expect(await files.save()).toBe(true)
    expect(document.edited.value).toBe(false)
    const reading = readPlan(host.writes[0]?.text ?? '')
    expect(reading.ok && reading.plan.programme.stroke).toBe(document.content.value.programme.stroke)
    document.change('stroke', setStrokeRatio(document.content.value, 2))
    await files.save()
    expect(host.writes[1]?.file).toEqual({ token: 'file-1', name: 'saved.ringwright.json' })
    await files.saveAs()
    expect(host.writes[2]?.file).toBeNull()
  })

  it('stays edited when saving is cancelled or fails, and tells the failure', async () => {
    const host = fakeHost()
    const { document, files, notices } = makeWorkspace(undefined, host)
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    host.saved = null
    expect(await files.save()).toBe(false)
    host.saved = { failure: 'The disk is full.' }
    expect(await files.save()).toBe(false)
    expect(document.edited.value).toBe(true)
    expect(notices.list.value.at(-1)).toMatchObject({ kind: 'failure', text: 'The disk is full.' })
  })

  it('opens a plan and brings back exactly what was written', async () => {
    const host = fakeHost()
    const plan = examplePlan('sharp-orifice')
    host.opened = { token: 'file-2', name: 'orifice.ringwright.json', text: writePlan(plan) }
    const { document, files } = makeWorkspace(undefined, host)
    await files.open()
    expect(writePlan(document.plan.value)).toBe(writePlan(plan))
    expect(document.file.value).toEqual({ token: 'file-2', name: 'orifice.ringwright.json' })
    expect(document.edited.value).toBe(false)
  })

  it('opens what the system gave, one file after another, and asks about unsaved changes before each', async () => {
    const host = fakeHost()
    const given = ['sharp-orifice', 'inspection-thruster'].map((id) => ({
      token: id,
      name: `${id}.ringwright.json`,
      text: writePlan(examplePlan(id)),
    }))
    host.givenPlan = async () => given.shift() ?? null
    const { document, files, leaving } = makeWorkspace(undefined, host)
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    const first = files.openGiven()
    const second = files.openGiven()
    await settle()
    expect(given).toHaveLength(1)
    leaving.value?.answer('discard')
    await Promise.all([first, second])
    expect(given).toEqual([])
    expect(document.file.value?.token).toBe('inspection-thruster')
  })

  it('tells why a given file cannot be opened, and does not ask for ever where nobody answers', async () => {
    const host = fakeHost()
    let asked = 0
    host.givenPlan = async () => {
      asked += 1
      return { failure: 'Nobody answers.' }
    }
    const { files, notices } = makeWorkspace(undefined, host)
    await files.openGiven()
    expect(asked).toBe(1)
    expect(notices.list.value.at(-1)).toMatchObject({ kind: 'failure', text: 'Nobody answers.' })
  })

  it('refuses what is no plan in a sentence and keeps what is open', async () => {
    const host = fakeHost()
    host.opened = { token: null, name: 'notes.json', text: '{"format":"something"}' }
    const { document, files, notices } = makeWorkspace(undefined, host)
    const before = document.content.value
    await files.open()
    expect(document.content.value).toBe(before)
    expect(notices.list.value.at(-1)?.text).toMatch(/^notes\.json was not opened: /u)
  })

  it('asks before unsaved changes are left, and each answer does what it says', async () => {
    const host = fakeHost()
    const { document, files, leaving } = makeWorkspace(undefined, host)
    const changed = setStrokeRatio(document.content.value, 3)
    document.change('stroke', changed)

    const kept = files.openExample('sharp-orifice')
    await settle()
    leaving.value?.answer('cancel')
    await kept
    expect(document.content.value).toBe(changed)

    const saved = files.openExample('sharp-orifice')
    await settle()
    leaving.value?.answer('save')
    await saved
    expect(host.writes).toHaveLength(1)
    expect(document.content.value.title).toBe('Sharp orifice in a plate')
    expect(document.file.value).toBeNull()

    document.change('stroke', setStrokeRatio(document.content.value, 1))
    const discarded = files.newPlan()
    await settle()
    leaving.value?.answer('discard')
    await discarded
    expect(host.writes).toHaveLength(1)
    expect(document.edited.value).toBe(false)
  })

  it('reads a table into the programme as one step, with the stroke the rows give', async () => {
    const host = fakeHost()
    // A triangle of 0.2 m/s over 1 s: stroke 0.1 m.
    host.table = { name: 'run.csv', text: 'time (s),speed (m/s)\n0,0\n0.5,0.2\n1,0\n' }
    const { document, files } = makeWorkspace(undefined, host)
    await files.openTable()
    expect(document.content.value.programme.shape).toBe('table')
    expect(document.content.value.programme.rows).toHaveLength(3)
    expect(document.content.value.programme.stroke).toBeCloseTo(0.1, 12)
    expect(document.undoName.value).toBe('table')
    document.undo()
    expect(document.content.value.programme.shape).toBe('trapezoid')
  })

  it('refuses a table that makes no programme and names what is wrong', async () => {
    const host = fakeHost()
    host.table = { name: 'run.csv', text: 'time (s),speed (m/s)\n0,0\n0.5,-0.2\n1,0\n' }
    const { document, files, notices } = makeWorkspace(undefined, host)
    await files.openTable()
    expect(document.content.value.programme.shape).toBe('trapezoid')
    expect(notices.list.value.at(-1)?.text).toMatch(/^run\.csv was not read: .*2/u)
  })

  it('turns to the page an example is about, and stays where it is when the example is not opened', async () => {
    const { files, page, jetView, document, leaving } = makeWorkspace()
    const at = async (id: string) => {
      await files.openExample(id)
      return page.value
    }
    expect(await at('catch-up')).toBe('wake')
    expect(await at('survey-vehicle')).toBe('thrust')
    expect(await at('tank-day')).toBe('tankRun')
    expect(await at('form-and-pinch-off')).toBe('stroke')
    expect(jetView.showing.value).toBe(true)
    expect(await at('sharp-orifice')).toBe('stroke')
    expect(jetView.showing.value).toBe(false)
    document.change('stroke', setStrokeRatio(document.content.value, 3))
    const kept = files.openExample('catch-up')
    await settle()
    leaving.value?.answer('cancel')
    await kept
    expect(page.value).toBe('stroke')
  })

  it('reads a dropped table as one and a dropped plan as another', async () => {
    const { document, files, notices } = makeWorkspace()
    await files.openDropped(new File(['0,0\n0.5,0.2\n1,0\n'], 'run.csv'))
    expect(document.content.value.programme.shape).toBe('table')
    expect(notices.list.value.at(-1)?.text).toMatch(/^Read 3 rows from run\.csv into the speed programme\. /u)
    const { document: other, files: otherFiles } = makeWorkspace()
    await otherFiles.openDropped(new File([writePlan(examplePlan('sharp-orifice'))], 'orifice.ringwright.json'))
    expect(other.content.value.nozzle.shape).toBe('orifice')
  })
})
