import { readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { inProject } from '../../build/scripts/root.mjs'

/** Values each room of core offers; a name that comes or goes shows here. Types leave no trace at run time. */
const indexes = import.meta.glob<Record<string, unknown>>('../../core/*/index.ts', { eager: true })

describe('public names of core', () => {
  it('are those of the list', () => {
    const names = Object.entries(indexes).map(([path, module]) => [
      path.split('/').at(-2),
      Object.keys(module).toSorted(),
    ])
    expect(Object.fromEntries(names)).toMatchSnapshot()
  })

  it('cover every room', () => {
    const rooms = readdirSync(inProject('core'), { withFileTypes: true }).filter((entry) => entry.isDirectory())
    expect(
      Object.keys(indexes)
        .map((path) => path.split('/').at(-2))
        .toSorted(),
    ).toEqual(rooms.map(({ name }) => name).toSorted())
  })
})
