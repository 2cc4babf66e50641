import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readBatchArguments } from '../../../app/batch/arguments'

describe('the runner’s command line', () => {
  it.each([
    [['a.json', '--out', 'o'], { plan: 'a.json', out: 'o', only: null }],
    [['--out', 'o', 'a.json'], { plan: 'a.json', out: 'o', only: null }],
    [['--out=o', 'a.json'], { plan: 'a.json', out: 'o', only: null }],
    [['-', '--out', 'o', '--only', 'water,pulse'], { plan: '-', out: 'o', only: ['water', 'pulse'] }],
    [['a.json', '--out', 'o', '--only=pulse, water,pulse'], { plan: 'a.json', out: 'o', only: ['pulse', 'water'] }],
    [['a.json', '--out', '-o'], { plan: 'a.json', out: '-o', only: null }],
  ])('reads %j', (list, request) => {
    expect(readBatchArguments(list)).toEqual({ ok: true, request })
  })

  it.each([
    [[], /^A plan file must be given\./],
    [['--out', 'o'], /^A plan file must be given\./],
    [['a.json'], /^--out must name the folder/],
    [['a.json', '--out'], /^--out needs a value\.$/],
    [['a.json', '--out', '--only', 'water'], /^--out needs a value\.$/],
    [['a.json', '--out='], /^--out needs a value\.$/],
    [['a.json', '--out', 'o', '--out', 'p'], /^--out may be given once\.$/],
    [['a.json', 'b.json', '--out', 'o'], /^One plan may be given, got a\.json and b\.json\.$/],
    [['a.json', '--out', 'o', '--only', 'smoke'], /^--only may list water, pulse, .*; got smoke\.$/],
    [['a.json', '--out', 'o', '--only', 'water,'], /got an empty name\.$/],
    [['a.json', '--out', 'o', '--fast'], /^--fast is not an argument of the runner\. Use: npm run --silent batch/],
    [['a.json', '--out', 'o', '-v'], /^-v is not an argument/],
    [['a.json', '--out', 'o', '--part', '1/2'], /^--part is not in this version of the runner\.$/],
    [['a.json', '--out', 'o', '--merge', 'p'], /^--merge is not in this version of the runner\.$/],
    [['a.json', '--out', 'o', '--checks'], /^--checks is not in this version of the runner\.$/],
  ])('refuses %j in a sentence', (list, message) => {
    const reading = readBatchArguments(list)
    expect(reading.ok ? '' : reading.message).toMatch(message)
  })

  it('never throws', () => {
    const word = fc.oneof(
      fc.constantFrom('--out', '--only', '--part', '-', 'a.json', '--out=', '--only=water'),
      fc.string(),
    )
    fc.assert(
      fc.property(fc.array(word), (list) => {
        expect(typeof readBatchArguments(list).ok).toBe('boolean')
      }),
    )
  })
})
