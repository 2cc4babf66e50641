/**
 * A printable document as data: the design record, the run sheet and the comparison are models of this one kind.
 */

export type Paper = 'A4' | 'Letter'

export interface DocumentColumn {
  readonly title: string
  /** Set to the right in figures of one width. */
  readonly numeric?: boolean
  /** Left empty, with room to write in. */
  readonly blank?: boolean
}

export type DocumentBlock =
  | { readonly kind: 'heading'; readonly text: string }
  | { readonly kind: 'subheading'; readonly text: string }
  | { readonly kind: 'paragraph'; readonly text: string; readonly tone?: 'plain' | 'limit' | 'small' }
  | { readonly kind: 'list'; readonly items: readonly string[] }
  /** Lines with a box to tick. */
  | { readonly kind: 'checklist'; readonly items: readonly string[] }
  | {
      readonly kind: 'table'
      readonly caption: string | null
      readonly columns: readonly DocumentColumn[]
      readonly rows: readonly (readonly string[])[]
      /** True: rows of several lines, so that even a short table may go on over the page. */
      readonly flows?: boolean
    }
  /** A name and its value a line, in two columns where there is room. */
  | { readonly kind: 'pairs'; readonly rows: readonly (readonly [name: string, value: string])[] }
  /** An SVG element of ours. */
  | { readonly kind: 'figure'; readonly svg: string; readonly caption: string }
  /** Small figures side by side, two in a row. */
  | { readonly kind: 'figures'; readonly items: readonly { readonly svg: string; readonly caption: string }[] }
  /** A formula with its name, what it says in words, and what is to be known of it. */
  | {
      readonly kind: 'derivation'
      readonly title: string
      readonly mathml: string
      readonly rows: readonly (readonly [name: string, value: string])[]
    }
  /** A formula: a <math> element of ours. */
  | { readonly kind: 'formula'; readonly mathml: string; readonly caption: string }
  /** Empty boxes to write in by hand, each with its label. */
  | { readonly kind: 'boxes'; readonly labels: readonly string[] }
  /** Ruled lines to write on. */
  | { readonly kind: 'lines'; readonly label: string; readonly count: number }
  | { readonly kind: 'pageBreak' }

export interface PrintDocument {
  /** What kind of document it is: stands above the title and in the foot of each page. */
  readonly kind: string
  readonly title: string
  readonly titleBlock: readonly (readonly [name: string, value: string])[]
  readonly blocks: readonly DocumentBlock[]
  /** True: headings, figures and tables with a caption carry numbers. */
  readonly numbered?: boolean
  /** Last line of the document: program, version, input hash. */
  readonly foot: string
}
