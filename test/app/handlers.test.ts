import { describe, expect, it } from 'vitest'
import { FileRefusal } from '../../app/files/fileSentence'
import { createPathTokens } from '../../app/files/pathTokens'
import { createHandlers, type OpenQuestion, type Services } from '../../app/handlers'

/** Services over a disk in memory; dialogs answer from a list. */
function fakes(
  answers: (string | null)[] = [],
  disk: Record<string, string | Uint8Array> = {},
  given: readonly string[] = [],
) {
  const waiting = [...given]
  const asked: OpenQuestion[] = []
  const saves: boolean[] = []
  const shown: { title: string; path: string | null }[] = []
  let count = 0
  const answer = async (question: OpenQuestion) => {
    asked.push(question)
    return answers.shift() ?? null
  }
  const services: Services = {
    dialogs: { open: answer, save: answer },
    files: {
      readText: async (filePath) => {
        const content = disk[filePath]
        if (typeof content !== 'string') throw Object.assign(new Error('no such file'), { code: 'ENOENT' })
        if (content === 'too large') throw new FileRefusal('it is larger than 50 MB (51 MB)')
        return content
      },
      save: async (filePath, content) => {
        if (filePath.startsWith('/full/')) throw Object.assign(new Error('no space'), { code: 'ENOSPC' })
        disk[filePath] = content
      },
    },
    tokens: createPathTokens(() => `token-${(count += 1)}`),
    given: { next: () => waiting.shift() ?? null },
    shell: {
      showDocument: (state, filePath) => shown.push({ title: state.title, path: filePath }),
      setTheme: () => undefined,
      saveEnded: (written) => saves.push(written),
    },
    information: { name: 'Ringwright', version: '1.2.3', platform: 'linux' },
  }
  return { handlers: createHandlers(services), disk, asked, saves, shown }
}

const PLAN = '/plans/ring one.ringwright.json'

describe('opening a plan', () => {
  it('gives the page a token, the name and the text, never the path', async () => {
    const { handlers } = fakes([PLAN], { [PLAN]: '{}' })
    const opened = await handlers.table['plan:open'](null)
    expect(opened).toEqual({ token: 'token-1', name: 'ring one.ringwright.json', text: '{}' })
    expect(JSON.stringify(opened)).not.toContain('/plans')
  })

  it('is null when the dialog is cancelled', async () => {
    expect(await fakes([null]).handlers.table['plan:open'](null)).toBeNull()
  })

  it('gives out the files that the system named, one at a time, then none', async () => {
    const { handlers, disk } = fakes([], { [PLAN]: '{}' }, [PLAN, '/plans/gone.json'])
    const opened = await handlers.table['plan:given'](null)
    expect(opened).toEqual({ token: 'token-1', name: 'ring one.ringwright.json', text: '{}' })
    await expect(handlers.table['plan:given'](null)).rejects.toThrow('“gone.json” could not be opened because')
    expect(await handlers.table['plan:given'](null)).toBeNull()
    await handlers.table['plan:save']({ token: 'token-1', name: '', text: 'changed' })
    expect(disk[PLAN]).toBe('changed')
  })

  it('says why a file cannot be opened', async () => {
    await expect(fakes(['/plans/gone.json']).handlers.table['plan:open'](null)).rejects.toThrow(
      '“gone.json” could not be opened because it, or the folder it should lie in, does not exist.',
    )
    await expect(fakes([PLAN], { [PLAN]: 'too large' }).handlers.table['plan:open'](null)).rejects.toThrow(
      '“ring one.ringwright.json” could not be opened because it is larger than 50 MB (51 MB).',
    )
  })

  it('starts the next dialog in the folder of the last file', async () => {
    const { handlers, asked } = fakes([PLAN, null], { [PLAN]: '{}' })
    await handlers.table['plan:open'](null)
    await handlers.table['plan:open'](null)
    expect(asked.map((question) => question.defaultPath)).toEqual([null, '/plans'])
    expect(asked[0]?.filters[0]?.extensions).toEqual(['ringwright.json', 'json'])
  })
})

describe('saving a plan', () => {
  it('writes back to the file behind the token without asking', async () => {
    const { handlers, disk, asked, saves } = fakes([PLAN], { [PLAN]: 'old' })
    await handlers.table['plan:open'](null)
    const saved = await handlers.table['plan:save']({ token: 'token-1', name: 'other name', text: 'new' })
    expect(saved).toEqual({ token: 'token-1', name: 'ring one.ringwright.json' })
    expect(disk).toEqual({ [PLAN]: 'new' })
    expect(asked).toHaveLength(1)
    expect(saves).toEqual([true])
  })

  it('asks where when there is no token, and adds the ending the user left out', async () => {
    const { handlers, disk, asked } = fakes(['/plans/mine'])
    const saved = await handlers.table['plan:save']({ token: null, name: '../we:ird', text: 'x' })
    expect(saved).toEqual({ token: 'token-1', name: 'mine.ringwright.json' })
    expect(Object.keys(disk)).toEqual(['/plans/mine.ringwright.json'])
    expect(asked[0]?.defaultPath).toBe('we ird.ringwright.json')
  })

  it('does not write to a token that was never given out', async () => {
    const { handlers, disk, saves } = fakes()
    await expect(handlers.table['plan:save']({ token: '/etc/hosts', name: 'a', text: 'x' })).rejects.toThrow(
      /not known/,
    )
    expect(disk).toEqual({})
    expect(saves).toEqual([false])
  })

  it('says why it failed, and tells the window that nothing was written', async () => {
    const { handlers, saves } = fakes(['/full/a.ringwright.json', null])
    await expect(handlers.table['plan:save']({ token: null, name: 'a', text: 'x' })).rejects.toThrow(
      '“a.ringwright.json” could not be saved because the disk is full.',
    )
    expect(await handlers.table['plan:save']({ token: null, name: 'a', text: 'x' })).toBeNull()
    expect(saves).toEqual([false, false])
  })

  it('tells the window which file it shows', async () => {
    const { handlers, shown } = fakes([PLAN], { [PLAN]: '{}' })
    const state = { title: 'One', edited: false, undo: null, redo: null }
    await handlers.table['window:document'](state)
    await handlers.table['plan:open'](null)
    await handlers.table['window:document'](state)
    expect(shown.map((entry) => entry.path)).toEqual([null, PLAN])
  })
})

describe('tables, exports and drops', () => {
  it('reads a table without a token to write it back', async () => {
    const { handlers } = fakes(['/data/speed.csv'], { '/data/speed.csv': 'time,speed' })
    expect(await handlers.table['table:open'](null)).toEqual({ name: 'speed.csv', text: 'time,speed' })
    expect(await handlers.openPath('/data/speed.csv')).toEqual({ token: '', name: 'speed.csv', text: 'time,speed' })
  })

  it('gives a dropped plan a token that saves back to it', async () => {
    const { handlers, disk } = fakes([], { [PLAN]: 'old' })
    const { token } = await handlers.openPath(PLAN)
    await handlers.table['plan:save']({ token, name: 'x', text: 'new' })
    expect(disk[PLAN]).toBe('new')
  })

  it('writes text exports as text and pictures as bytes', async () => {
    const { handlers, disk } = fakes(['/out/a.csv', '/out/b.png', null])
    await handlers.table['export:save']({ kind: 'csv', name: 'a', text: 'x,y', base64: null })
    await handlers.table['export:save']({ kind: 'png', name: 'b', text: null, base64: 'iVBORw==' })
    expect(disk['/out/a.csv']).toBe('x,y')
    expect(disk['/out/b.png']).toEqual(Buffer.from([0x89, 0x50, 0x4e, 0x47]))
    expect(await handlers.table['export:save']({ kind: 'svg', name: 'c', text: '<svg/>', base64: null })).toBeNull()
  })

  it('tells what the program is', async () => {
    expect(await fakes().handlers.table['app:information'](null)).toEqual({
      name: 'Ringwright',
      version: '1.2.3',
      platform: 'linux',
    })
  })
})
