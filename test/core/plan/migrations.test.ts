import { describe, expect, it } from 'vitest'
import { migrate, MIGRATIONS, PLAN_VERSION, type Migration } from '../../../core/plan'

describe('migrate', () => {
  it('has one step for every version before this one', () => {
    expect(MIGRATIONS.map((migration) => migration.from)).toEqual(
      Array.from({ length: PLAN_VERSION - 1 }, (_, i) => i + 1),
    )
  })

  it('applies the steps in order and sets the version', () => {
    const steps: readonly Migration[] = [
      { from: 2, up: (document) => ({ ...document, second: true }) },
      { from: 1, up: (document) => ({ ...document, first: document['second'] === undefined }) },
    ]
    expect(migrate({ version: 1 }, 1, steps, 3)).toEqual({ version: 3, first: true, second: true })
  })

  it('does not accept a gap', () => {
    expect(() => migrate({ version: 1 }, 1, [], 2)).toThrow(/no migration from plan version 1/)
  })
})
