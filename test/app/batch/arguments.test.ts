import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { readBatchArguments } from '../../../app/batch/arguments'

const WHOLE = { part: null, merge: null, data: null }
/** A request that asks for nothing beyond plan and folder. */
const PLAIN = { plan: 'a.json', out: 'o', only: null, ...WHOLE }

describe('the runner’s command line', () => {
  it.each([
    [['a.json', '--out', 'o'], { plan: 'a.json', out: 'o', only: null, ...WHOLE }],
    [['--out', 'o', 'a.json'], { plan: 'a.json', out: 'o', only: null, ...WHOLE }],
    [['--out=o', 'a.json'], { plan: 'a.json', out: 'o', only: null, ...WHOLE }],
    [['-', '--out', 'o', '--only', 'water,pulse'], { plan: '-', out: 'o', only: ['water', 'pulse'], ...WHOLE }],
    [
      ['a.json', '--out', 'o', '--only=pulse, water,pulse'],
      { plan: 'a.json', out: 'o', only: ['pulse', 'water'], ...WHOLE },
    ],
    [['a.json', '--out', 'o', '--part', '2/8'], { ...PLAIN, part: { index: 2, of: 8 } }],
    [
      ['a.json', '--out', 'o', '--part=1/1', '--only', 'sweep'],
      { ...PLAIN, only: ['sweep'], part: { index: 1, of: 1 } },
    ],
    [['a.json', '--out', 'o', '--data', 'day 3'], { ...PLAIN, data: 'day 3' }],
    [['a.json', '--out', 'o', '--merge', 'p', 'q', 'r'], { ...PLAIN, merge: ['p', 'q', 'r'] }],
    [['a.json', '--merge', 'p', 'q', '--out', 'o'], { ...PLAIN, merge: ['p', 'q'] }],
    [['--merge=p', 'q', '--out', 'o', 'a.json'], { ...PLAIN, merge: ['p', 'q'] }],
    [['--merge', 'p', '-', '--out', 'o'], { ...PLAIN, plan: '-', merge: ['p'] }],
    [['a.json', '--out', '-o'], { plan: 'a.json', out: '-o', only: null, ...WHOLE }],
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
    [['a.json', '--out', 'o', '--part'], /^--part needs a value\.$/],
    [['a.json', '--out', 'o', '--part', '3/2'], /^--part must be i\/n with i from 1 to n, such as 2\/8; got 3\/2\.$/],
    [['a.json', '--out', 'o', '--part', '0/2'], /got 0\/2\.$/],
    [['a.json', '--out', 'o', '--part', 'a'], /got a\.$/],
    [['a.json', '--out', 'o', '--part', '1/2', '--part', '2/2'], /^--part may be given once\.$/],
    [
      ['a.json', '--out', 'o', '--part', '1/2', '--only', 'pulse,sweep'],
      /^--only may list water and sweep with --part/,
    ],
    [['a.json', '--out', 'o', '--part', '1/2', '--merge', 'p'], /^--part and --merge may not stand together/],
    [['a.json', '--out', 'o', '--merge'], /^--merge must be followed by the folders that hold the parts\.$/],
    [['a.json', '--out', 'o', '--merge='], /^--merge must be followed by/],
    [['a.json', '--out', 'o', '--merge', 'p', '--merge', 'q'], /^--merge may be given once/],
    [['a.json', '--out', 'o', '--merge', 'p', '--only', 'sweep'], /^--only may not stand with --merge/],
    [
      ['--out', 'o', '--merge', 'p', 'a.json'],
      /^A plan file must be given, before --merge: all words after it are folders\./,
    ],
    [['a.json', '--out', 'o', '--checks'], /^--checks is not in this version of the runner\.$/],
  ])('refuses %j in a sentence', (list, message) => {
    const reading = readBatchArguments(list)
    expect(reading.ok ? '' : reading.message).toMatch(message)
  })

  it.each([[['--help']], [['a.json', '--out', 'o', '-h']], [['--fast', '--help']]])('helps at %j', (list) => {
    expect(readBatchArguments(list)).toEqual({ ok: true, request: 'help' })
  })

  it('never throws', () => {
    const word = fc.oneof(
      fc.constantFrom(
        '--out',
        '--only',
        '--part',
        '--part=1/2',
        '--merge',
        '--merge=',
        '-',
        'a.json',
        '--out=',
        '--only=water',
      ),
      fc.string(),
    )
    fc.assert(
      fc.property(fc.array(word), (list) => {
        expect(typeof readBatchArguments(list).ok).toBe('boolean')
      }),
    )
  })
})
