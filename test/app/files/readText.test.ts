import { mkdtemp, rm, truncate, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { fileSentence } from '../../../app/files/fileSentence'
import { decodeText, readText } from '../../../app/files/readText'
import { MAXIMUM_FILE_BYTES } from '../../../app/limits'

let folder = ''
beforeAll(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright-read-'))
})
afterAll(() => rm(folder, { recursive: true, force: true }))

async function sentenceFor(name: string): Promise<string> {
  try {
    await readText(path.join(folder, name))
    return ''
  } catch (error) {
    return fileSentence('open', name, error)
  }
}

describe('readText', () => {
  it('reads UTF-8 and takes the byte-order mark off', async () => {
    await writeFile(path.join(folder, 'mark.json'), '\uFEFF{"µ": "½"}')
    expect(await readText(path.join(folder, 'mark.json'))).toBe('{"µ": "½"}')
  })

  it('refuses a file over 50 MB before reading it', async () => {
    await writeFile(path.join(folder, 'large.json'), '')
    await truncate(path.join(folder, 'large.json'), MAXIMUM_FILE_BYTES + 1)
    expect(await sentenceFor('large.json')).toBe(
      '“large.json” could not be opened because it is larger than 50 MB (51 MB).',
    )
  })

  it.each([
    ['low byte first', 'utf-16le', [0xff, 0xfe]],
    ['high byte first', 'utf-16be', [0xfe, 0xff]],
  ])('reads UTF-16 that begins with its mark, %s', async (_, name, mark) => {
    const bytes = Buffer.from('{"µ": "½ 😀"}', 'utf16le')
    if (name === 'utf-16be') bytes.swap16()
    await writeFile(path.join(folder, `${name}.json`), Buffer.concat([Buffer.from(mark), bytes]))
    expect(await readText(path.join(folder, `${name}.json`))).toBe('{"µ": "½ 😀"}')
    await writeFile(path.join(folder, `${name}.json`), Buffer.concat([Buffer.from(mark), bytes.subarray(1)]))
    expect(await sentenceFor(`${name}.json`)).toMatch(/because it is not UTF-8 text, nor UTF-16 text with a byte-order/)
  })

  it('refuses bytes that are not text', async () => {
    await writeFile(path.join(folder, 'picture.json'), Buffer.from([0x89, 0x50, 0xff, 0xfe]))
    expect(await sentenceFor('picture.json')).toBe(
      '“picture.json” could not be opened because it is not UTF-8 text, nor UTF-16 text with a byte-order mark.',
    )
  })

  it('says that a missing file and a folder are not files', async () => {
    expect(await sentenceFor('missing.json')).toMatch(/does not exist\.$/)
    expect(fileSentence('open', 'x', Object.assign(new Error('x'), { code: 'EISDIR' }))).toMatch(/it is a folder\.$/)
  })

  it('names a code it has no words for, and never an engine’s own text', () => {
    expect(fileSentence('save', 'x', Object.assign(new Error('odd, at /home'), { code: 'EODD' }))).toBe(
      '“x” could not be saved because the system reported EODD.',
    )
    expect(fileSentence('save', 'x', new Error('at /home'))).not.toContain('/home')
  })
})

describe('decodeText', () => {
  it('refuses more than 50 MB', () => {
    expect(() => decodeText(new Uint8Array(MAXIMUM_FILE_BYTES + 1))).toThrow(/larger than 50 MB/)
  })
})
