/**
 * What each request does, with dialogs, files and the window handed in: nothing here knows Electron.
 */
import path from 'node:path'
import type { OpenedFile, Requests, Theme } from './contract'
import { RequestFailure, type HandlerTable } from './dispatch'
import { filtersOf, safeFileName, withEnding, type FileFilter, type FileKind } from './fileNames'
import { fileSentence } from './files/fileSentence'
import type { PathTokens } from './files/pathTokens'
import type { GivenFiles } from './givenFiles'

export interface OpenQuestion {
  readonly filters: FileFilter[]
  readonly defaultPath: string | null
}

export interface Services {
  /** Dialogs answer the chosen path, or null when cancelled. */
  readonly dialogs: {
    open(question: OpenQuestion): Promise<string | null>
    save(question: OpenQuestion): Promise<string | null>
  }
  readonly files: {
    readText(filePath: string): Promise<string>
    save(filePath: string, content: string | Uint8Array): Promise<void>
  }
  readonly tokens: PathTokens
  /** Files the system gave the program to open. */
  readonly given: Pick<GivenFiles, 'next'>
  readonly shell: {
    showDocument(state: Requests['window:document']['in'], filePath: string | null): void
    setTheme(theme: Theme): void
    /** A save ended: written, or cancelled or failed. */
    saveEnded(written: boolean): void
  }
  readonly information: Requests['app:information']['out']
}

export interface Handlers {
  readonly table: HandlerTable
  /** Open a file whose path came from outside the page. */
  openPath(filePath: string): Promise<OpenedFile>
}

export function createHandlers(services: Services): Handlers {
  const { dialogs, files, tokens, given, shell } = services
  /** Folder of the last file opened or saved: where the next dialog starts. */
  let folder: string | null = null
  /** File the window shows, for the title bar's icon where a platform has one. */
  let shown: string | null = null

  async function readText(filePath: string): Promise<string> {
    try {
      return await files.readText(filePath)
    } catch (error) {
      throw new RequestFailure('read', fileSentence('open', path.basename(filePath), error))
    }
  }

  async function write(filePath: string, content: string | Uint8Array): Promise<void> {
    try {
      await files.save(filePath, content)
    } catch (error) {
      throw new RequestFailure('write', fileSentence('save', path.basename(filePath), error))
    }
  }

  async function choose(kind: FileKind): Promise<string | null> {
    const chosen = await dialogs.open({ filters: filtersOf(kind), defaultPath: folder })
    if (chosen !== null) folder = path.dirname(chosen)
    return chosen
  }

  async function chooseTarget(kind: FileKind, name: string): Promise<string | null> {
    const safe = safeFileName(kind, name)
    const chosen = await dialogs.save({
      filters: filtersOf(kind),
      defaultPath: folder === null ? safe : path.join(folder, safe),
    })
    if (chosen === null) return null
    folder = path.dirname(chosen)
    return withEnding(kind, chosen)
  }

  async function openPath(filePath: string): Promise<OpenedFile> {
    const text = await readText(filePath)
    const name = path.basename(filePath)
    folder = path.dirname(filePath)
    // A table is read into the plan and never written back: its token names nothing.
    if (!/\.json$/i.test(name)) return { token: '', name, text }
    shown = filePath
    return { token: tokens.tokenOf(filePath), name, text }
  }

  async function savePlan({ token, name, text }: Requests['plan:save']['in']): Promise<Requests['plan:save']['out']> {
    const known = token === null ? null : tokens.pathOf(token)
    if (token !== null && known === null) {
      throw new RequestFailure('token', 'The file to save to is not known any more: use Save as to choose it again.')
    }
    const target = known ?? (await chooseTarget('plan', name))
    if (target === null) return null
    await write(target, text)
    shown = target
    return { token: tokens.tokenOf(target), name: path.basename(target) }
  }

  const table: HandlerTable = {
    'plan:open': async () => {
      const chosen = await choose('plan')
      return chosen === null ? null : openPath(chosen)
    },
    'plan:given': async () => {
      const next = given.next()
      return next === null ? null : openPath(next)
    },
    'plan:save': async (input) => {
      let written = false
      try {
        const saved = await savePlan(input)
        written = saved !== null
        return saved
      } finally {
        shell.saveEnded(written)
      }
    },
    'table:open': async () => {
      const chosen = await choose('table')
      return chosen === null ? null : { name: path.basename(chosen), text: await readText(chosen) }
    },
    'export:save': async ({ kind, name, text, base64 }) => {
      const target = await chooseTarget(kind, name)
      if (target === null) return null
      await write(target, base64 === null ? (text ?? '') : Buffer.from(base64, 'base64'))
      return { name: path.basename(target) }
    },
    'window:document': async (state) => {
      shell.showDocument(state, shown)
      return null
    },
    'window:theme': async ({ theme }) => {
      shell.setTheme(theme)
      return null
    },
    'app:information': async () => services.information,
  }
  return { table, openPath }
}
