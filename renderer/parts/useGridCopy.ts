/** Copying rows of a table: by the copy keys for the marked ones, by a button for all. */
import { ref, type Ref } from 'vue'
import { copyCells, type CellRows } from './copyCells'

export interface GridCopy {
  /** What was copied, in words. */
  readonly said: Readonly<Ref<string>>
  /** Answer a copy event with some rows. */
  answer(event: ClipboardEvent, rows: readonly number[]): void
  /** Put some rows on the clipboard. */
  write(rows: readonly number[]): Promise<void>
}

/** @param asText heading and full-precision cells of some rows */
export function useGridCopy(asText: (rows: readonly number[]) => CellRows): GridCopy {
  const said = ref('')
  const tell = (count: number): void => {
    said.value = `${count} row${count === 1 ? '' : 's'} copied.`
  }
  return {
    said,
    answer(event, rows) {
      const { text, html } = copyCells(asText(rows))
      event.clipboardData?.setData('text/plain', text)
      event.clipboardData?.setData('text/html', html)
      event.preventDefault()
      tell(rows.length)
    },
    async write(rows) {
      const { text, html } = copyCells(asText(rows))
      const blob = (type: string, content: string): Blob => new Blob([content], { type })
      try {
        await navigator.clipboard.write([
          new ClipboardItem({ 'text/plain': blob('text/plain', text), 'text/html': blob('text/html', html) }),
        ])
        tell(rows.length)
      } catch {
        said.value = 'The clipboard cannot be used by a button here: press the copy keys in the table instead.'
      }
    },
  }
}
