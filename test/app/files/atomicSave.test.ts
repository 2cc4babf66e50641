import {
  chmod,
  lstat,
  mkdtemp,
  open,
  readdir,
  readFile,
  realpath,
  rename,
  rm,
  stat,
  symlink,
  unlink,
  writeFile,
} from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import fc from 'fast-check'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { createSaver, type FileSystem } from '../../../app/files/atomicSave'

const REAL: FileSystem = { open, rename, unlink, stat, realpath }
const STAGES = ['open', 'writeFile', 'chmod', 'sync', 'close', 'rename'] as const
type Stage = (typeof STAGES)[number]

let folder = ''
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright-save-'))
})
afterEach(() => rm(folder, { recursive: true, force: true }))

/** The real file system that fails at one stage, after having done half of what it should where that matters. */
function failingAt(stage: Stage | null): FileSystem {
  const fail = (at: Stage): void => {
    if (at === stage) throw Object.assign(new Error(`failed at ${at}`), { code: 'EIO' })
  }
  return {
    ...REAL,
    async open(filePath, flags, mode) {
      if (flags === 'wx') fail('open')
      const handle = await open(filePath, flags, mode)
      return {
        async writeFile(content) {
          if (stage === 'writeFile') await handle.writeFile(content.slice(0, 1))
          fail('writeFile')
          await handle.writeFile(content)
        },
        async chmod(bits) {
          fail('chmod')
          await handle.chmod(bits)
        },
        async sync() {
          if (flags === 'wx') fail('sync')
          await handle.sync()
        },
        async close() {
          await handle.close()
          if (flags === 'wx') fail('close')
        },
      }
    },
    async rename(from, to) {
      fail('rename')
      await rename(from, to)
    },
  }
}

let count = 0
function saver(files: FileSystem) {
  return createSaver(files, { durable: true, syncFolder: true, unique: () => String((count += 1)) })
}

describe('an atomic save', () => {
  it('writes a new file and leaves nothing else behind', async () => {
    const target = path.join(folder, 'plan one.ringwright.json')
    await saver(REAL)(target, 'text ½')
    expect(await readFile(target, 'utf8')).toBe('text ½')
    expect(await readdir(folder)).toEqual(['plan one.ringwright.json'])
  })

  it.each(STAGES)('leaves the old file and no temporary one when it fails at %s', async (stage) => {
    const target = path.join(folder, 'a.json')
    await writeFile(target, 'old')
    await expect(saver(failingAt(stage))(target, 'new content')).rejects.toThrow(`failed at ${stage}`)
    expect(await readFile(target, 'utf8')).toBe('old')
    expect(await readdir(folder)).toEqual(['a.json'])
  })

  it.each(STAGES.filter((stage) => stage !== 'chmod'))(
    'leaves no file at all when a new one fails at %s',
    async (stage) => {
      await expect(saver(failingAt(stage))(path.join(folder, 'a.json'), 'new')).rejects.toThrow(`failed at ${stage}`)
      expect(await readdir(folder)).toEqual([])
    },
  )

  it('keeps the file whole, old or new, over any sequence of saves and failures', async () => {
    const step = fc.record({ content: fc.string(), stage: fc.constantFrom(null, ...STAGES) })
    await fc.assert(
      fc.asyncProperty(fc.array(step, { maxLength: 6 }), async (steps) => {
        const target = path.join(folder, 'b.json')
        await writeFile(target, 'first')
        let expected = 'first'
        for (const { content, stage } of steps) {
          const outcome = await saver(failingAt(stage))(target, content).then(
            () => true,
            () => false,
          )
          expect(outcome).toBe(stage === null)
          if (outcome) expected = content
          expect(await readFile(target, 'utf8')).toBe(expected)
        }
        expect(await readdir(folder)).toEqual(['b.json'])
      }),
      { numRuns: 20 },
    )
  })

  it('keeps the permissions of the file it replaces', async () => {
    const target = path.join(folder, 'private.json')
    await writeFile(target, 'old')
    await chmod(target, 0o640)
    await saver(REAL)(target, 'new')
    expect((await stat(target)).mode & 0o777).toBe(0o640)
  })

  it('writes through a link and leaves it a link', async () => {
    const target = path.join(folder, 'real.json')
    const link = path.join(folder, 'link.json')
    await writeFile(target, 'old')
    await symlink(target, link)
    await saver(REAL)(link, 'new')
    expect((await lstat(link)).isSymbolicLink()).toBe(true)
    expect(await readFile(target, 'utf8')).toBe('new')
  })

  it('lets saves of one file wait for each other, so that the last one asked for stands', async () => {
    const target = path.join(folder, 'queue.json')
    const save = saver(REAL)
    const texts = Array.from({ length: 20 }, (_, i) => 'x'.repeat(20_000 - i * 1000) + i)
    await Promise.all(texts.map((text) => save(target, text)))
    expect(await readFile(target, 'utf8')).toBe(texts.at(-1))
    expect(await readdir(folder)).toEqual(['queue.json'])
  })

  it('saves again after a save of the same file has failed', async () => {
    const target = path.join(folder, 'again.json')
    let stage: Stage | null = 'rename'
    const files: FileSystem = { ...REAL, rename: (from, to) => failingAt(stage).rename(from, to) }
    const save = saver(files)
    const first = save(target, 'one')
    await expect(first).rejects.toThrow()
    stage = null
    await save(target, 'two')
    expect(await readFile(target, 'utf8')).toBe('two')
  })

  it('does not fail when the folder itself cannot be synced', async () => {
    const target = path.join(folder, 'c.json')
    const files: FileSystem = {
      ...REAL,
      open: (filePath, flags, mode) =>
        flags === 'r' ? Promise.reject(new Error('no folders here')) : open(filePath, flags, mode),
    }
    await saver(files)(target, 'new')
    expect(await readFile(target, 'utf8')).toBe('new')
  })
})
