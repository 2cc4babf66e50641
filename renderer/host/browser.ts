/**
 * The browser face: files by input and drop, saving through the browser's save dialog where it has one, else by download.
 */
import type { ExportKind } from '../../app/contract'
import { chosenFile, pickFile, pickFiles, readFile } from './pickFile'
import { findSavePicker, isCancelled, writeWhole, type SavePicker, type WritableFile } from './savePicker'
import { isFailure, type Host, type HostFailure, type PlanFile } from './types'

/** What the host needs of the page's global object. */
export type Page = Pick<Window, 'document' | 'addEventListener' | 'performance'> & {
  readonly URL: Pick<typeof URL, 'createObjectURL' | 'revokeObjectURL'>
}

const PLAN_TYPE = { description: 'Ringwright plan', accept: { 'application/json': ['.json'] } }
const PLAN_FILES = '.json,application/json'
export const TABLE_FILES = '.csv,.tsv,.txt,text/csv,text/plain'

const EXPORT_TYPES: Readonly<Record<ExportKind, string>> = {
  csv: 'text/csv',
  svg: 'image/svg+xml',
  png: 'image/png',
  vtp: 'application/xml',
  gltf: 'model/gltf+json',
  html: 'text/html',
  txt: 'text/plain',
  lists: 'application/json',
}

/** Time for the browser to take a download over before its content is let go [ms]. */
const DOWNLOAD_GRACE = 60_000

/** No person closes a dialog sooner after it was asked for [ms]. */
const FASTEST_ANSWER = 200

export function createBrowserHost(page: Page): Host {
  const { document } = page
  const picker = findSavePicker(page)
  /** Files chosen in the save dialog, by the token the window knows them by. */
  const chosen = new Map<string, WritableFile>()
  let edited = false

  page.addEventListener('beforeunload', (event) => {
    // The browser asks in its own words whether to leave.
    if (edited) event.preventDefault()
  })

  function download(name: string, content: Blob): void {
    const address = page.URL.createObjectURL(content)
    const link = document.createElement('a')
    link.href = address
    link.download = name
    link.hidden = true
    document.body.append(link)
    link.click()
    link.remove()
    setTimeout(() => page.URL.revokeObjectURL(address), DOWNLOAD_GRACE)
  }

  function downloadPlan(name: string, text: string): PlanFile {
    download(name, new Blob([text], { type: 'application/json' }))
    return { token: null, name }
  }

  async function saveWithPicker(ask: SavePicker, name: string, text: string): Promise<PlanFile | HostFailure | null> {
    let file: WritableFile
    const asked = page.performance.now()
    try {
      file = await ask({ suggestedName: name, types: [PLAN_TYPE] })
    } catch (error) {
      // A dialog that is not allowed here, or gone before anyone could have closed it, was never shown.
      const closedByUser = isCancelled(error) && page.performance.now() - asked > FASTEST_ANSWER
      return closedByUser ? null : downloadPlan(name, text)
    }
    const token = `file-${chosen.size + 1}`
    const saved = await write(file, text, token)
    if (!isFailure(saved)) chosen.set(token, file)
    return saved
  }

  async function open(accept: string): Promise<{ name: string; text: string } | HostFailure | null> {
    const file = await pickFile(document, accept)
    return file === null ? null : read(file)
  }

  return {
    kind: 'browser',
    async openPlan() {
      const opened = await open(PLAN_FILES)
      return opened === null || isFailure(opened) ? opened : { ...opened, token: null }
    },
    async openDropped(file) {
      const opened = await read(file)
      return isFailure(opened) ? opened : { ...opened, token: null }
    },
    openTable: () => open(TABLE_FILES),
    chooseTables: async () => (await pickFiles(document, TABLE_FILES)).map(chosenFile),
    async savePlan(file, name, text) {
      const token = file?.token ?? null
      const known = token === null ? undefined : chosen.get(token)
      if (known !== undefined) return write(known, text, token)
      return picker === null ? downloadPlan(name, text) : saveWithPicker(picker, name, text)
    },
    async exportFile(kind, name, content) {
      // A copy into memory of its own: a view on shared memory is not taken by a Blob.
      const part = typeof content === 'string' ? content : new Uint8Array(content)
      download(name, new Blob([part], { type: EXPORT_TYPES[kind] }))
      return { name }
    },
    showDocument(state) {
      edited = state.edited
      document.title = `${state.edited ? '• ' : ''}${state.title} – Ringwright`
    },
    // The page follows its own choice; a browser window has no appearance of its own to set.
    setTheme: () => undefined,
    onCommand: () => () => undefined,
    givenPlan: async () => null,
    onGiven: () => () => undefined,
  }
}

async function read(file: File): Promise<{ name: string; text: string } | HostFailure> {
  const text = await readFile(file)
  return typeof text === 'string' ? { name: file.name, text } : text
}

async function write(file: WritableFile, text: string, token: string | null): Promise<PlanFile | HostFailure> {
  try {
    await writeWhole(file, text)
    return { token, name: file.name }
  } catch (error) {
    const why =
      error instanceof Error && error.name === 'NotAllowedError'
        ? 'the browser was not given leave to write it'
        : 'the browser could not write it'
    return { failure: `“${file.name}” could not be saved because ${why}.` }
  }
}
