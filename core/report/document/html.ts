/**
 * Printable documents as HTML: every text escaped, every tag closed; figures and formulas are the writers' own SVG and MathML.
 */
import { escapeXml } from '../svgText'
import { DOCUMENT_STYLE, pageRule } from './style'
import type { DocumentBlock, DocumentColumn, Paper, PrintDocument } from './types'

/** The article alone, for a window that brings the style itself. */
export function documentBody(document: PrintDocument): string {
  const { kind, title, titleBlock, blocks, foot, numbered = false } = document
  return [
    `<article class="print-document${numbered ? ' numbered' : ''}">`,
    `<header><p class="kind">${escapeXml(kind)}</p><h1>${escapeXml(title)}</h1>`,
    `${pairs(titleBlock, 'title-block')}</header>`,
    ...blocks.map(block),
    `<footer>${escapeXml(foot)}</footer>`,
    '</article>',
  ].join('\n')
}

/** A whole file that stands alone: no script, nothing loaded. @param paper null: that of the printer */
export function documentHtml(document: PrintDocument, paper: Paper | null): string {
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<title>${escapeXml(`${document.title} - ${document.kind}`)}</title>
<style>${pageRule(paper, `${document.kind}: ${document.title}`)}${DOCUMENT_STYLE}</style>
</head>
<body>
${documentBody(document)}
</body>
</html>
`
}

function block(item: DocumentBlock): string {
  switch (item.kind) {
    case 'heading':
      return `<h2>${escapeXml(item.text)}</h2>`
    case 'subheading':
      return `<h3>${escapeXml(item.text)}</h3>`
    case 'paragraph':
      return `<p${item.tone === undefined || item.tone === 'plain' ? '' : ` class="${item.tone}"`}>${escapeXml(item.text)}</p>`
    case 'list':
      return list(item.items, '')
    case 'checklist':
      return list(item.items, ' class="ticks"')
    case 'table':
      return table(item.caption, item.columns, item.rows, item.flows === true)
    case 'pairs':
      return pairs(item.rows, '')
    case 'figure':
      return `<figure>${item.svg}<figcaption>${escapeXml(item.caption)}</figcaption></figure>`
    case 'figures':
      return `<div class="figures">${item.items.map(({ svg, caption }) => `<figure>${svg}<figcaption>${escapeXml(caption)}</figcaption></figure>`).join('')}</div>`
    case 'derivation':
      return `<section class="derivation"><h4>${escapeXml(item.title)}</h4>${item.mathml}${pairs(item.rows, 'stacked')}</section>`
    case 'formula':
      return `<figure>${item.mathml}<figcaption>${escapeXml(item.caption)}</figcaption></figure>`
    case 'boxes':
      return `<div class="boxes">${item.labels.map((label) => `<div>${escapeXml(label)}</div>`).join('')}</div>`
    case 'lines':
      return `<div class="lines"><p class="small">${escapeXml(item.label)}</p>${'<div></div>'.repeat(item.count)}</div>`
    case 'pageBreak':
      return '<div class="page-break"></div>'
  }
}

function list(items: readonly string[], attribute: string): string {
  return `<ul${attribute}>${items.map((text) => `<li>${escapeXml(text)}</li>`).join('')}</ul>`
}

function pairs(rows: readonly (readonly [string, string])[], name: string): string {
  const lines = rows.map(([term, value]) => `<div><dt>${escapeXml(term)}</dt><dd>${escapeXml(value)}</dd></div>`)
  return `<dl${name === '' ? '' : ` class="${name}"`}>${lines.join('')}</dl>`
}

/** A table of at most so many rows is not broken across pages. */
const KEPT_WHOLE = 12

function table(
  caption: string | null,
  columns: readonly DocumentColumn[],
  rows: readonly (readonly string[])[],
  flows: boolean,
): string {
  const numeric = (index: number): string => {
    const { numeric: right = false, blank = false } = columns[index] ?? {}
    const names = [right ? 'numeric' : '', blank ? 'blank' : ''].filter((name) => name !== '').join(' ')
    return names === '' ? '' : ` class="${names}"`
  }
  const head = columns.map(({ title }, index) => `<th scope="col"${numeric(index)}>${escapeXml(title)}</th>`)
  const body = rows.map(
    (cells) => `<tr>${cells.map((cell, index) => `<td${numeric(index)}>${escapeXml(cell)}</td>`).join('')}</tr>`,
  )
  return [
    flows || rows.length > KEPT_WHOLE ? '<table>' : '<table class="whole">',
    caption === null ? '' : `<caption>${escapeXml(caption)}</caption>`,
    `<thead><tr>${head.join('')}</tr></thead><tbody>`,
    ...body,
    '</tbody></table>',
  ].join('')
}
