import path from 'node:path'
import { pathToFileURL } from 'node:url'
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { createGivenFiles, fileOf } from '../../app/givenFiles'

const FOLDER = path.resolve('/home/user/plans')

describe('a word of the command line', () => {
  it.each([
    ['a relative path', 'ring one.ringwright.json', path.join(FOLDER, 'ring one.ringwright.json')],
    ['an absolute path', path.resolve('/data/a.json'), path.resolve('/data/a.json')],
    ['a file URL', pathToFileURL(path.resolve('/data/ring ü.json')).href, path.resolve('/data/ring ü.json')],
    ['a table', 'readings.csv', path.join(FOLDER, 'readings.csv')],
    ['a switch', '--inspect=0.0.0.0', null],
    ['a switch that ends like a plan', '--user-data-dir=a.json', null],
    ['another kind of file', 'picture.png', null],
    ['a folder', '.', null],
    ['an address', 'https://example.org/a.json?b', null],
    ['a file URL of another computer', 'file://other.example/%00.json', null],
    ['nothing', '', null],
  ])('that is %s', (_what, word, file) => {
    expect(fileOf(word, FOLDER)).toBe(file)
  })

  it('never throws, and gives only absolute paths of plans and tables', () => {
    fc.assert(
      fc.property(
        fc.oneof(
          fc.string(),
          fc.webUrl(),
          fc.string().map((text) => `file:${text}`),
        ),
        (word) => {
          const file = fileOf(word, FOLDER)
          if (file !== null) {
            expect(path.isAbsolute(file)).toBe(true)
            expect(file).toMatch(/\.(json|csv|tsv|txt)$/i)
          }
        },
      ),
    )
  })
})

describe('files that wait', () => {
  it('come out in the order they came in, and are told of only where there are some', () => {
    let told = 0
    const given = createGivenFiles(() => (told += 1))
    given.give(['--switch', 'picture.png'], FOLDER)
    expect([told, given.next()]).toEqual([0, null])
    given.give(['a.json', '-x', 'b.json'], FOLDER)
    given.give(['c.json'], FOLDER)
    expect(told).toBe(2)
    expect([given.next(), given.next(), given.next(), given.next()]).toEqual([
      path.join(FOLDER, 'a.json'),
      path.join(FOLDER, 'b.json'),
      path.join(FOLDER, 'c.json'),
      null,
    ])
  })
})
