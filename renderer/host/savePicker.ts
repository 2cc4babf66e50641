/**
 * The File System Access API as far as saving needs it. Browsers without it download instead.
 */
export interface WritableFile {
  readonly name: string
  createWritable(): Promise<{ write(content: string | Blob): Promise<void>; close(): Promise<void> }>
}

export interface PickerOptions {
  readonly suggestedName: string
  readonly types: readonly {
    readonly description: string
    readonly accept: Readonly<Record<string, readonly string[]>>
  }[]
}

export type SavePicker = (options: PickerOptions) => Promise<WritableFile>

/** The page's save dialog, null where the browser has none. */
export function findSavePicker(page: object): SavePicker | null {
  const picker: unknown = Reflect.get(page, 'showSaveFilePicker')
  if (typeof picker !== 'function') return null
  return async (options) => {
    const chosen: unknown = await Reflect.apply(picker, page, [options])
    if (!isWritableFile(chosen)) throw new TypeError('The save dialog gave no file.')
    return chosen
  }
}

/** True when the user closed a dialog without choosing. */
export function isCancelled(error: unknown): boolean {
  return error instanceof Error && error.name === 'AbortError'
}

/** Replace the whole file. The browser writes beside it and swaps on close. */
export async function writeWhole(file: WritableFile, content: string | Blob): Promise<void> {
  const stream = await file.createWritable()
  await stream.write(content)
  await stream.close()
}

function isWritableFile(value: unknown): value is WritableFile {
  if (typeof value !== 'object' || value === null) return false
  return typeof Reflect.get(value, 'name') === 'string' && typeof Reflect.get(value, 'createWritable') === 'function'
}
