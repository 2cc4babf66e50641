/**
 * Formulas as presentation MathML, built from few pieces so that every tag is closed and every text escaped.
 */

/** A piece of a formula: finished MathML. */
export type Maths = { readonly mathml: string }

const ESCAPES: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' }

/** Text safe inside markup and attributes. */
export function escapeMarkup(text: string): string {
  return text.replace(/[&<>"]/g, (character) => ESCAPES[character] ?? character)
}

function element(name: string, children: readonly Maths[]): Maths {
  return { mathml: `<${name}>${children.map((child) => child.mathml).join('')}</${name}>` }
}

function leaf(name: string, text: string): Maths {
  return { mathml: `<${name}>${escapeMarkup(text)}</${name}>` }
}

/** A word or symbol, a number, or an operator, told by its first character. */
function token(text: string): Maths {
  if (/^[0-9]/.test(text)) return leaf('mn', text)
  return leaf(/^[\p{L}]/u.test(text) ? 'mi' : 'mo', text)
}

function piece(item: Maths | string): Maths {
  if (typeof item !== 'string') return item
  const tokens = item.split(' ').filter((text) => text !== '')
  return tokens.length === 1 ? token(item.trim()) : element('mrow', tokens.map(token))
}

/** Pieces side by side; a string is split at spaces into symbols, numbers and operators. */
export function row(...items: readonly (Maths | string)[]): Maths {
  return element('mrow', items.map(piece))
}

/** A word between formulas, with its own space on both sides: tokens stand close together. */
export function words(text: string): Maths {
  return leaf('mtext', `\u00A0${text}\u00A0`)
}

export function over(top: Maths | string, bottom: Maths | string): Maths {
  return element('mfrac', [piece(top), piece(bottom)])
}

export function power(base: Maths | string, exponent: Maths | string): Maths {
  return element('msup', [piece(base), piece(exponent)])
}

export function sub(base: Maths | string, index: string): Maths {
  return element('msub', [piece(base), leaf('mi', index)])
}

export function root(inner: Maths | string): Maths {
  return element('msqrt', [piece(inner)])
}

/** The whole formula as one <math> element in display style. */
export function formula(...items: readonly (Maths | string)[]): string {
  return `<math display="block">${row(...items).mathml}</math>`
}
