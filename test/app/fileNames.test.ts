import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { filtersOf, safeFileName, withEnding, type FileKind } from '../../app/fileNames'

const KINDS: readonly FileKind[] = ['plan', 'table', 'csv', 'svg', 'png', 'vtp', 'gltf', 'html', 'txt', 'lists']

describe('safeFileName', () => {
  it.each([
    ['plan', 'Ring one', 'Ring one.ringwright.json'],
    ['plan', 'Ring one.ringwright.json', 'Ring one.ringwright.json'],
    ['plan', 'Ring one.json', 'Ring one.ringwright.json'],
    ['plan', '../../etc/passwd', 'etc passwd.ringwright.json'],
    ['plan', 'a\0b\nc', 'a b c.ringwright.json'],
    ['plan', '', 'untitled.ringwright.json'],
    ['plan', '...', 'untitled.ringwright.json'],
    ['plan', 'CON', 'CON plan.ringwright.json'],
    ['plan', 'Wirbelring Ø 30', 'Wirbelring Ø 30.ringwright.json'],
    ['csv', 'pulse.csv', 'pulse.csv'],
    ['png', 'C:\\x\\y', 'C x y.png'],
    ['vtp', 'rings at 1.5 s', 'rings at 1.5 s.vtp'],
    ['gltf', 'rings.gltf', 'rings.gltf'],
    ['html', 'Run sheet', 'Run sheet.html'],
    ['txt', 'profile-read-first', 'profile-read-first.txt'],
    ['lists', 'parts.ringwright-lists.json', 'parts.ringwright-lists.json'],
    ['lists', 'our nozzles', 'our nozzles.ringwright-lists.json'],
  ] as const)('%s %j becomes %j', (kind, suggested, name) => {
    expect(safeFileName(kind, suggested)).toBe(name)
  })

  it('is one part of a path with its ending, whatever is suggested', () => {
    fc.assert(
      fc.property(fc.constantFrom(...KINDS), fc.string({ unit: 'binary', maxLength: 300 }), (kind, suggested) => {
        const name = safeFileName(kind, suggested)
        expect(name).not.toMatch(/[/\\:*?"<>|]/)
        expect(name.startsWith('.')).toBe(false)
        expect(name.length).toBeLessThan(255)
        expect(withEnding(kind, name)).toBe(name)
      }),
    )
  })
})

describe('the filters', () => {
  it('put our own kind first and all files last, without dots', () => {
    for (const kind of KINDS) {
      const filters = filtersOf(kind)
      expect(filters.at(-1)?.extensions).toEqual(['*'])
      expect(filters).toHaveLength(2)
      expect(filters.flatMap((filter) => filter.extensions).some((extension) => extension.startsWith('.'))).toBe(false)
    }
  })
})
