import { mkdtemp, mkdir, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { oneAtATime } from '../../build/scripts/lock.mjs'

let folder = ''
let lock = ''
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'ringwright-lock-'))
  lock = path.join(folder, 'lock')
})
afterEach(() => rm(folder, { recursive: true, force: true }))

describe('the lock of install and build', () => {
  it('lets one work at a time, and the next after it', async () => {
    const order: string[] = []
    const work = (name: string) =>
      oneAtATime(async () => {
        order.push(`${name} in`)
        await new Promise((resolve) => setImmediate(resolve))
        order.push(`${name} out`)
      }, lock)
    await Promise.all([work('a'), work('b')])
    expect(order).toEqual(['a in', 'a out', 'b in', 'b out'])
  })

  it('is given back when the work fails', async () => {
    await expect(oneAtATime(() => Promise.reject(new Error('broken')), lock)).rejects.toThrow('broken')
    expect(await oneAtATime(async () => 'next', lock)).toBe('next')
  })

  it('is taken over from a process that is gone', async () => {
    await mkdir(lock)
    // Process numbers stay below 2^22 on every system the program runs on.
    await writeFile(path.join(lock, 'process'), '99999999')
    expect(await oneAtATime(async () => 'mine', lock)).toBe('mine')
  })
})
