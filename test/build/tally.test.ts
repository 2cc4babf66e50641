import { describe, expect, it } from 'vitest'
import { tallyLine, tallyOf } from '../../build/scripts/tally.mjs'

function report(changes: object): string {
  return JSON.stringify({
    numPassedTests: 5,
    numFailedTests: 0,
    numPendingTests: 0,
    numTodoTests: 0,
    testResults: [],
    ...changes,
  })
}

describe('the closing line of npm test', () => {
  it('counts what the runner reports', () => {
    expect(tallyOf(report({}))).toEqual({ passed: 5, failed: 0, skipped: 0 })
    expect(tallyOf(report({ numPendingTests: 2, numTodoTests: 1 }))).toEqual({ passed: 5, failed: 0, skipped: 3 })
  })

  it('counts a file that could not be loaded as a failure, and one with a failed test not twice', () => {
    const testResults = [
      { status: 'failed', assertionResults: [] },
      { status: 'failed', assertionResults: [{ status: 'passed' }, { status: 'failed' }] },
      { status: 'passed', assertionResults: [{ status: 'passed' }] },
    ]
    expect(tallyOf(report({ numFailedTests: 1, testResults }))).toMatchObject({ failed: 2 })
  })

  it('takes nothing else for a report', () => {
    expect(tallyOf('')).toBeNull()
    expect(tallyOf('{}')).toBeNull()
    expect(tallyOf('null')).toBeNull()
  })

  it('reads like the line that is looked for', () => {
    expect(tallyLine({ passed: 5, failed: 0, skipped: 0 })).toBe('5 passed, 0 failed')
    expect(tallyLine({ passed: 5, failed: 1, skipped: 2 })).toBe('5 passed, 1 failed, 2 skipped')
  })
})
