/**
 * The style of every printed document: black on white, readable in grey, the same on screen and on paper.
 */
import { FONT_FAMILY } from '../svgText'
import type { Paper } from './types'

/** Page size with margins, and the foot of each page: what it belongs to on the left, its number on the right. */
export function pageRule(paper: Paper | null, foot = ''): string {
  const size = paper === null ? '' : `size:${paper === 'A4' ? 'A4' : 'letter'};`
  const type = `font:8pt ${FONT_FAMILY};color:#333`
  return [
    `@page{${size}margin:15mm 15mm 17mm;`,
    `@bottom-left{content:${cssString(foot)};${type};white-space:nowrap;overflow:hidden}`,
    `@bottom-right{content:counter(page) " of " counter(pages);${type}}}`,
  ].join('')
}

/** A text as a string of a style sheet: what could end it, or the sheet, is written by its number. */
function cssString(text: string): string {
  return `"${text.replace(/[^\p{L}\p{N} ,.:;()+-]/gu, (character) => `\\${(character.codePointAt(0) ?? 32).toString(16)} `)}"`
}

export const DOCUMENT_STYLE = `
.print-document{font:10.5pt/1.4 ${FONT_FAMILY};color:#000;background:#fff;font-variant-numeric:tabular-nums;max-width:180mm;margin:0 auto}
.print-document *{box-sizing:border-box}
.print-document header{border-bottom:1.5pt solid #000;margin-bottom:5mm;padding-bottom:2mm}
.print-document .kind{font-size:9pt;letter-spacing:.08em;text-transform:uppercase;margin:0}
.print-document h1{font-size:18pt;line-height:1.2;margin:1mm 0 2mm}
.print-document h2{font-size:12.5pt;margin:6mm 0 2mm;border-bottom:.5pt solid #777;break-after:avoid}
.print-document h3{font-size:10.5pt;margin:4mm 0 1mm;break-after:avoid}
.print-document h3+p.small{break-after:avoid}
.print-document p{margin:0 0 2mm;orphans:3;widows:3}
.print-document p.limit{border-left:2pt solid #8f2e0b;padding-left:2.5mm}
.print-document p.small,.print-document figcaption,.print-document caption{font-size:9pt;color:#333}
.print-document ul{margin:0 0 2mm;padding-left:5mm}
.print-document li{break-inside:avoid;margin-bottom:.7mm}
.print-document ul.ticks{list-style:none;padding-left:0}
.print-document ul.ticks li{padding-left:7mm;position:relative;min-height:5.5mm}
.print-document ul.ticks li::before{content:"";position:absolute;left:0;top:.7mm;width:3.6mm;height:3.6mm;border:.8pt solid #000}
.print-document table{border-collapse:collapse;width:100%;margin:0 0 3mm;font-size:9.5pt}
.print-document caption{text-align:left;padding-bottom:1mm}
.print-document th{text-align:left;font-weight:600;border-bottom:.8pt solid #000;padding:.8mm 2mm .8mm 0;vertical-align:bottom}
.print-document td{border-bottom:.4pt solid #aaa;padding:.8mm 2mm .8mm 0;vertical-align:top;overflow-wrap:break-word}
.print-document thead{display:table-header-group}
.print-document tr{break-inside:avoid}
.print-document table.whole{break-inside:avoid}
.print-document .numeric{text-align:right}
.print-document td.numeric{white-space:nowrap}
.print-document .numeric+:not(.numeric):not(.blank){padding-left:4mm}
.print-document .blank{border-left:.4pt solid #aaa;padding-left:1.5mm;min-width:17mm}
.print-document td.blank{height:7.5mm}
.print-document dl{columns:2;column-gap:8mm;margin:0 0 3mm;break-inside:avoid}
.print-document dl.title-block{margin-bottom:0}
.print-document dl div{display:flex;justify-content:space-between;gap:4mm;break-inside:avoid;border-bottom:.4pt solid #aaa;padding:.6mm 0}
.print-document dd{margin:0;text-align:right;overflow-wrap:break-word}
.print-document figure{margin:0 0 4mm;break-inside:avoid}
.print-document figure svg{display:block;width:100%;height:auto;max-height:110mm}
.print-document .boxes{display:flex;gap:4mm;margin:2mm 0 3mm}
.print-document .boxes div{flex:1;border:.8pt solid #000;height:16mm;padding:1mm 2mm;font-size:9pt}
.print-document.numbered{counter-reset:part figure table}
.print-document.numbered h2{counter-increment:part}
.print-document.numbered h2::before{content:counter(part) "  "}
.print-document.numbered figcaption::before{counter-increment:figure;content:"Figure " counter(figure) ". "}
.print-document.numbered caption::before{counter-increment:table;content:"Table " counter(table) ". "}
.print-document .figures{display:grid;grid-template-columns:1fr 1fr;gap:3mm 6mm;margin:0 0 4mm}
.print-document .figures figure{margin:0}
.print-document .figures figure:only-child{grid-column:1/-1;max-width:125mm}
.print-document .derivation{display:grid;grid-template-columns:62mm 1fr;column-gap:5mm;break-inside:avoid;border-top:.4pt solid #aaa;padding:1.6mm 0}
.print-document h2+.derivation{border-top:0}
.print-document .derivation h4{grid-column:1/-1;font-size:10pt;margin:0 0 1mm}
.print-document .derivation math{display:inline math;math-style:normal;font-size:10pt;align-self:start;padding-top:.5mm}
.print-document dl.stacked{columns:1;margin:0;font-size:8.8pt;line-height:1.32}
.print-document dl.stacked div{display:grid;grid-template-columns:19mm 1fr;gap:2mm;border:0;padding:.3mm 0}
.print-document dl.stacked dt{color:#444}
.print-document dl.stacked dd{text-align:left}
.print-document .lines{break-inside:avoid}
.print-document .lines div{border-bottom:.5pt solid #777;height:8mm}
.print-document footer{break-inside:avoid;break-before:avoid;border-top:.5pt solid #777;margin-top:6mm;padding-top:1.5mm;font-size:8.5pt;color:#333;overflow-wrap:anywhere}
.print-document .page-break{break-after:page}
@media screen{.print-document{padding:10mm 0}}
`
