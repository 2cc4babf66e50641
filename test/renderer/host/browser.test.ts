import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { createBrowserHost, type Page } from '../../../renderer/host/browser'
import { isFailure } from '../../../renderer/host'

interface Download {
  readonly name: string
  readonly content: Blob
}

let downloads: Download[] = []
let clock = 0

const blobs = new Map<string, Blob>()

/** A click on a link with a download, taken as the browser takes it. */
function takeDownload(event: Event): void {
  const link = event.target
  if (!(link instanceof HTMLAnchorElement)) return
  event.preventDefault()
  const content = blobs.get(link.href)
  if (content !== undefined) downloads.push({ name: link.download, content })
}

/** The page with its clock, its downloads and, where given, a save dialog under the test's control. */
function pageWith(picker: unknown = undefined): Page {
  const addresses = {
    createObjectURL: (blob: Blob) => {
      const address = `blob:test-${blobs.size}`
      blobs.set(address, blob)
      return address
    },
    revokeObjectURL: (address: string) => void blobs.delete(address),
  }
  return Object.assign(Object.create(null), {
    document,
    addEventListener: window.addEventListener.bind(window),
    performance: { now: () => clock },
    URL: addresses,
    ...(picker === undefined ? {} : { showSaveFilePicker: picker }),
  })
}

/** A file of the save dialog that keeps what is written to it. */
function fakeFile(name: string, failure: Error | null = null) {
  const written: unknown[] = []
  return {
    written,
    name,
    createWritable: async () => {
      if (failure !== null) throw failure
      return { write: async (content: unknown) => void written.push(content), close: async () => undefined }
    },
  }
}

function named(name: string): Error {
  return Object.assign(new Error(name), { name })
}

/** The browser's own file dialog: the input that was added, with a file put into it. */
function answerFileDialog(file: File | null): void {
  const input = document.querySelector<HTMLInputElement>('input[type=file]')
  if (input === null) throw new Error('no file was asked for')
  if (file !== null) Object.defineProperty(input, 'files', { value: [file] })
  input.dispatchEvent(new Event(file === null ? 'cancel' : 'change'))
}

beforeEach(() => {
  vi.useFakeTimers()
  document.addEventListener('click', takeDownload)
  blobs.clear()
  downloads = []
  clock = 0
})
afterEach(() => {
  vi.useRealTimers()
  document.removeEventListener('click', takeDownload)
  document.body.replaceChildren()
})

describe('opening in the browser', () => {
  it('reads the file of the dialog and leaves nothing on the page', async () => {
    const opening = createBrowserHost(pageWith()).openPlan()
    answerFileDialog(new File(['\uFEFF{"µ":1}'], 'a.ringwright.json'))
    expect(await opening).toEqual({ token: null, name: 'a.ringwright.json', text: '{"µ":1}' })
    expect(document.querySelector('input')).toBeNull()
  })

  it('is null when the dialog is closed', async () => {
    const opening = createBrowserHost(pageWith()).openTable()
    answerFileDialog(null)
    expect(await opening).toBeNull()
  })

  it('refuses a dropped file that is too large or not text, in a sentence', async () => {
    const host = createBrowserHost(pageWith())
    const large = new File(['x'], 'large.json')
    Object.defineProperty(large, 'size', { value: 50 * 1024 * 1024 + 1 })
    expect(await host.openDropped(large)).toEqual({
      failure: '“large.json” could not be opened because it is larger than 50 MB (51 MB).',
    })
    expect(await host.openDropped(new File([new Uint8Array([0x89, 0xff, 0xfe])], 'picture.json'))).toEqual({
      failure:
        '“picture.json” could not be opened because it is not UTF-8 text, nor UTF-16 text with a byte-order mark.',
    })
    const gone = new File(['x'], 'gone.json')
    Object.defineProperty(gone, 'arrayBuffer', { value: () => Promise.reject(named('NotFoundError')) })
    expect(isFailure(await host.openDropped(gone))).toBe(true)
  })
})

describe('saving in the browser', () => {
  it('downloads where there is no save dialog', async () => {
    const saved = await createBrowserHost(pageWith()).savePlan(null, 'a.ringwright.json', '{}')
    expect(saved).toEqual({ token: null, name: 'a.ringwright.json' })
    expect(downloads.map(({ name }) => name)).toEqual(['a.ringwright.json'])
    expect(await downloads[0]?.content.text()).toBe('{}')
  })

  it('writes to the file chosen in the save dialog, and to the same one again without asking', async () => {
    const file = fakeFile('chosen.ringwright.json')
    const picker = vi.fn(async () => file)
    const host = createBrowserHost(pageWith(picker))
    const saved = await host.savePlan(null, 'a.ringwright.json', 'one')
    if (saved === null || isFailure(saved)) throw new Error('not saved')
    expect(saved.name).toBe('chosen.ringwright.json')
    expect(await host.savePlan(saved, 'a.ringwright.json', 'two')).toEqual(saved)
    expect(file.written).toEqual(['one', 'two'])
    expect(picker).toHaveBeenCalledTimes(1)
    expect(picker).toHaveBeenCalledWith(expect.objectContaining({ suggestedName: 'a.ringwright.json' }))
    expect(downloads).toEqual([])
  })

  it('is null when the person closes the save dialog', async () => {
    const picker = async () => {
      clock += 1500
      throw named('AbortError')
    }
    expect(await createBrowserHost(pageWith(picker)).savePlan(null, 'a.json', '{}')).toBeNull()
    expect(downloads).toEqual([])
  })

  it.each([
    ['is not allowed', named('SecurityError')],
    ['is gone before anyone could have closed it', named('AbortError')],
  ])('downloads when the save dialog %s', async (_what, error) => {
    const host = createBrowserHost(pageWith(() => Promise.reject(error)))
    expect(await host.savePlan(null, 'a.json', '{}')).toEqual({ token: null, name: 'a.json' })
    expect(downloads).toHaveLength(1)
  })

  it('says why a chosen file could not be written', async () => {
    const host = createBrowserHost(pageWith(async () => fakeFile('a.json', named('NotAllowedError'))))
    expect(await host.savePlan(null, 'a.json', '{}')).toEqual({
      failure: '“a.json” could not be saved because the browser was not given leave to write it.',
    })
  })

  it('downloads exports with their type', async () => {
    const host = createBrowserHost(pageWith())
    await host.exportFile('csv', 'pulse.csv', 'x,y\r\n')
    await host.exportFile('png', 'ring.png', new Uint8Array([1, 2, 3]))
    await host.exportFile('vtp', 'rings.vtp', '<VTKFile/>')
    await host.exportFile('gltf', 'rings.gltf', '{}')
    expect(downloads.map(({ name, content }) => [name, content.type, content.size])).toEqual([
      ['pulse.csv', 'text/csv', 5],
      ['ring.png', 'image/png', 3],
      ['rings.vtp', 'application/xml', 10],
      ['rings.gltf', 'model/gltf+json', 2],
    ])
  })
})

describe('the browser window', () => {
  it('shows the document and its edited mark in the title, and guards leaving while edited', () => {
    const host = createBrowserHost(pageWith())
    const leave = (): boolean => {
      const event = new Event('beforeunload', { cancelable: true })
      window.dispatchEvent(event)
      return !event.defaultPrevented
    }
    host.showDocument({ title: 'Ring one', edited: true, undo: null, redo: null })
    expect(document.title).toBe('• Ring one – Ringwright')
    expect(leave()).toBe(false)
    host.showDocument({ title: 'Ring one', edited: false, undo: null, redo: null })
    expect(document.title).toBe('Ring one – Ringwright')
    expect(leave()).toBe(true)
  })

  it('has no menu', () => {
    const host = createBrowserHost(pageWith())
    host.setTheme('dark')
    expect(host.onCommand(() => undefined)()).toBeUndefined()
  })
})

describe('choosing several tables', () => {
  it('gives names and sizes at once and the bytes of each when it is read', async () => {
    const asked = createBrowserHost(pageWith()).chooseTables()
    const input = document.querySelector<HTMLInputElement>('input[type=file]')
    expect(input?.multiple).toBe(true)
    const files = [new File(['time,x'], 'a.csv'), new File(['1,2,3'], 'b.csv')]
    if (input !== null) Object.defineProperty(input, 'files', { value: files })
    input?.dispatchEvent(new Event('change'))
    const chosen = await asked
    expect(chosen.map(({ name, size }) => [name, size])).toEqual([
      ['a.csv', 6],
      ['b.csv', 5],
    ])
    const bytes = await chosen[1]?.read()
    expect(bytes instanceof ArrayBuffer ? new TextDecoder().decode(bytes) : bytes).toBe('1,2,3')
  })

  it('gives none when the dialog is closed without a choice', async () => {
    const asked = createBrowserHost(pageWith()).chooseTables()
    answerFileDialog(null)
    expect(await asked).toEqual([])
  })
})
