/**
 * Saving so that a crash, a full disk or a pulled plug leaves either the old file or the new one, never half of one.
 */
import path from 'node:path'

/** The calls of `node:fs/promises` a save makes: handed in, so that a test can let each one fail. */
export interface FileSystem {
  open(filePath: string, flags: string, mode?: number): Promise<FileToWrite>
  rename(from: string, to: string): Promise<void>
  unlink(filePath: string): Promise<void>
  stat(filePath: string): Promise<{ readonly mode: number }>
  realpath(filePath: string): Promise<string>
}

export interface FileToWrite {
  writeFile(content: string | Uint8Array): Promise<void>
  chmod(mode: number): Promise<void>
  sync(): Promise<void>
  close(): Promise<void>
}

export interface SaverOptions {
  /** Wait until the disk has the content. Off only for output that can be made again. */
  readonly durable: boolean
  /** Folders cannot be opened for syncing on Windows. */
  readonly syncFolder: boolean
  /** A text for temporary names that does not repeat. */
  readonly unique: () => string
}

export type Save = (filePath: string, content: string | Uint8Array) => Promise<void>

const PERMISSION_BITS = 0o777

/** A save function over `files`: writes to one path wait for each other, writes to different paths do not. */
export function createSaver(files: FileSystem, options: SaverOptions): Save {
  const queues = new Map<string, Promise<void>>()
  return (filePath, content) => {
    const key = path.resolve(filePath)
    const before = queues.get(key) ?? Promise.resolve()
    // The one before may have failed: that was told to its own caller.
    const job = before.catch(() => undefined).then(() => saveOnce(files, options, key, content))
    queues.set(key, job)
    const forget = () => {
      if (queues.get(key) === job) queues.delete(key)
    }
    job.then(forget, forget)
    return job
  }
}

async function saveOnce(
  files: FileSystem,
  options: SaverOptions,
  filePath: string,
  content: string | Uint8Array,
): Promise<void> {
  // A link stays a link: the file it points to is replaced.
  const target = await orWhenMissing(files.realpath(filePath), filePath)
  const mode = await orWhenMissing(
    files.stat(target).then((found) => found.mode & PERMISSION_BITS),
    null,
  )
  const folder = path.dirname(target)
  // The name must not grow past what a file system allows, so only the start of it is repeated.
  const temporary = path.join(folder, `.${path.basename(target).slice(0, 60)}.${options.unique()}.tmp`)
  const handle = await files.open(temporary, 'wx', mode ?? 0o666)
  try {
    try {
      await handle.writeFile(content)
      if (mode !== null) await handle.chmod(mode)
      if (options.durable) await handle.sync()
    } finally {
      await handle.close()
    }
    await files.rename(temporary, target)
  } catch (error) {
    await files.unlink(temporary).catch(() => undefined)
    throw error
  }
  if (options.durable && options.syncFolder) await syncFolder(files, folder)
}

/** The rename itself is on the disk only once the folder is; some file systems refuse this, and the file is whole anyway. */
async function syncFolder(files: FileSystem, folder: string): Promise<void> {
  try {
    const handle = await files.open(folder, 'r')
    try {
      await handle.sync()
    } finally {
      await handle.close()
    }
  } catch {
    return
  }
}

async function orWhenMissing<T, U>(found: Promise<T>, missing: U): Promise<T | U> {
  try {
    return await found
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return missing
    throw error
  }
}
