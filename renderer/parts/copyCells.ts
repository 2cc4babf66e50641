/** Cells as the clipboard carries them: tab-separated text and an HTML table, heading first. Pure. */
export interface CellRows {
  readonly header: readonly string[]
  readonly rows: readonly (readonly string[])[]
}

export function copyCells({ header, rows }: CellRows): { readonly text: string; readonly html: string } {
  const text = [header, ...rows].map((cells) => cells.join('\t')).join('\n')
  const line = (cells: readonly string[], tag: 'th' | 'td'): string =>
    `<tr>${cells.map((cell) => `<${tag}>${escaped(cell)}</${tag}>`).join('')}</tr>`
  const html = `<table>${line(header, 'th')}${rows.map((cells) => line(cells, 'td')).join('')}</table>`
  return { text: `${text}\n`, html }
}

function escaped(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;')
}
