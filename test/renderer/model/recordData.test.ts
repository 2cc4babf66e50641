import { describe, expect, it } from 'vitest'
import { examplePlan, setField } from '../../../core/plan'
import { run } from '../../../core/run'
import { recordDataOf } from '../../../renderer/model/recordData'
import type { Workspace } from '../../../renderer/model/workspace'
import { makeWorkspace } from '../parts/mountWithWorkspace'

async function until(done: () => boolean): Promise<void> {
  for (let i = 0; i < 6000 && !done(); i++) await new Promise((resolve) => setTimeout(resolve, 5))
  expect(done()).toBe(true)
}

const figuresOf = (workspace: Workspace) =>
  until(() => workspace.results.status.value === 'current' && workspace.thrust.quick.status.value === 'current')

/** A plan whose cautions tell its numbers: a shortfall at its speed. */
const SLOW = setField(examplePlan('survey-vehicle'), 'programme.stroke', 0.1)

describe('the record of the open plan', () => {
  it('after a sizing and another design tells the cautions of that design, as a run of it alone does', async () => {
    const workspace = makeWorkspace(SLOW)
    workspace.page.value = 'thrust'
    await figuresOf(workspace)
    workspace.thrust.run()
    await until(() => workspace.thrust.sizing.status.value === 'current')
    const sized = workspace.thrust.sizing.finished.value
    const candidate = sized?.sizing.candidates[0]
    if (sized === null || candidate === undefined) throw new Error('nothing was found')
    const before = sized.data.cautions.find(({ id }) => id === 'thruster-shortfall')
    expect(before).toBeDefined()

    workspace.thrust.openCandidate(candidate, 1)
    await figuresOf(workspace)
    const plan = workspace.document.content.value
    const record = recordDataOf(workspace)
    const alone = await run(plan, { sections: ['water', 'pulse', 'thruster'] })
    expect(record?.cautions).toEqual(alone.data?.cautions)
    // Its second duty point asks for another frequency: there is a shortfall here too, with other numbers.
    expect(record?.cautions).not.toContainEqual(before)
    expect(new Set(record?.cautions.map(({ id }) => id)).size).toBe(record?.cautions.length)
    expect(record?.thruster?.result).toEqual(alone.data?.thruster?.result)
    expect(record?.thruster?.sizing).toBe(sized.sizing)
  }, 60_000)

  it('has no figures of the design that a sizing began with where those of the open one are not computed', async () => {
    const workspace = makeWorkspace(SLOW)
    workspace.page.value = 'thrust'
    await figuresOf(workspace)
    workspace.thrust.run()
    await until(() => workspace.thrust.sizing.status.value === 'current')
    const candidate = workspace.thrust.sizing.finished.value?.sizing.candidates[0]
    if (candidate === undefined) throw new Error('nothing was found')
    workspace.page.value = 'stroke'
    workspace.thrust.openCandidate(candidate, 1)
    await until(() => workspace.results.status.value === 'current')
    const record = recordDataOf(workspace)
    expect(record?.thruster).toBeNull()
    expect(record?.cautions.filter(({ id }) => /^(?:thruster|sizing)-/u.test(id))).toEqual([])
  }, 60_000)
})
