import { EventEmitter } from 'node:events'
import { describe, expect, it } from 'vitest'
import { outliveReader } from '../../app/batch'

describe('a stream whose reader has gone', () => {
  it('does not end the run, however often it is told', () => {
    const stream = new EventEmitter()
    outliveReader(stream)
    outliveReader(stream)
    expect(stream.listenerCount('error')).toBe(1)
    expect(() => stream.emit('error', Object.assign(new Error('write EPIPE'), { code: 'EPIPE' }))).not.toThrow()
  })

  it('still tells of other failures', () => {
    const stream = new EventEmitter()
    outliveReader(stream)
    expect(() => stream.emit('error', Object.assign(new Error('disk full'), { code: 'ENOSPC' }))).toThrow('disk full')
  })
})
