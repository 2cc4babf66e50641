/**
 * Spelling of units: one key for every way of writing the same product of powers.
 *
 * `m/s`, `m·s^-1`, `m s-1` share a key, and so do `cm2/s`, `cm^2/s`, `cm²/s`. Case matters, as in the SI.
 */

/** Words and letters that stand for a symbol of the table. */
const ATOM_SPELLINGS: ReadonlyMap<string, string> = new Map([
  ['l', 'L'],
  ['ml', 'mL'],
  ['µl', 'µL'],
  ['ul', 'µL'],
  ['sec', 's'],
  ['secs', 's'],
  ['second', 's'],
  ['seconds', 's'],
  ['mins', 'min'],
  ['minute', 'min'],
  ['minutes', 'min'],
  ['hr', 'h'],
  ['hrs', 'h'],
  ['hour', 'h'],
  ['hours', 'h'],
  ['inch', 'in'],
  ['inches', 'in'],
  ['"', 'in'],
  ['foot', 'ft'],
  ['feet', 'ft'],
  ['metre', 'm'],
  ['metres', 'm'],
  ['meter', 'm'],
  ['meters', 'm'],
  ['litre', 'L'],
  ['litres', 'L'],
  ['liter', 'L'],
  ['liters', 'L'],
  ['knot', 'kn'],
  ['knots', 'kn'],
  ['kts', 'kn'],
  ['deg', '°'],
  ['degree', '°'],
  ['degrees', '°'],
  ['degC', '°C'],
  ['degF', '°F'],
])

const SUPERSCRIPTS = '⁰¹²³⁴⁵⁶⁷⁸⁹'
const SUPERSCRIPT_RUN = /[⁺⁻]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+/gu
const INVISIBLE = /[\u200B-\u200F\u2060\uFEFF]/gu
const DASHES = /[\u2212\u2013\uFE63\uFF0D]/gu

/**
 * Typed or pasted text in one alphabet: superscripts as ^n (before anything could turn 10² into 102), dashes used
 * as minus as '-', every kind of space as a plain one, both code points of micro as µ.
 */
export function plainText(text: string): string {
  return text
    .replace(INVISIBLE, '')
    .replace(SUPERSCRIPT_RUN, superscriptToPower)
    .replace(DASHES, '-')
    .normalize('NFKC')
    .replaceAll('\u03BC', '\u00B5')
    .trim()
}

function superscriptToPower(run: string): string {
  const digits = Array.from(run, (letter) =>
    letter === '⁻' ? '-' : letter === '⁺' ? '+' : String(SUPERSCRIPTS.indexOf(letter)),
  )
  return `^${digits.join('')}`
}

const ATOM = /^([A-Za-zµ°%‰"]+)(?:\^?([+-]?\d{1,2}))?/u

/**
 * The key of a unit written in plain text, or null where it is not a product of powers.
 * A product after a division without brackets (kg/m·s) has two readings and is refused.
 */
export function unitKey(text: string): string | null {
  const powers = new Map<string, number>()
  let rest = text
    .replace(/(?:degrees?|deg|°)\s+([CF])$/u, '°$1')
    .replaceAll('**', '^')
    .trim()
  if (rest.startsWith('1/') || rest.startsWith('1 /')) rest = rest.slice(1).trimStart()
  let divided = false
  for (let first = true; rest !== ''; first = false) {
    const joint = /^\s*([/·⋅*.×]?)\s*/u.exec(rest)
    const sign = joint?.[1] ?? ''
    if (first ? sign !== '' && sign !== '/' : sign !== '/' && divided) return null
    if (sign === '/') divided = true
    rest = rest.slice(joint?.[0].length ?? 0)
    const atom = ATOM.exec(rest)
    if (atom === null) return null
    const name = atomSymbol(atom[1] ?? '')
    const power = Number(atom[2] ?? '1') * (sign === '/' ? -1 : 1)
    powers.set(name, (powers.get(name) ?? 0) + power)
    rest = rest.slice(atom[0].length)
  }
  return Array.from(powers, ([name, power]) => `${name}^${power}`)
    .sort()
    .join(' ')
}

/** The table's symbol for one written symbol: known spellings, and u for micro. */
function atomSymbol(written: string): string {
  const known = ATOM_SPELLINGS.get(written)
  if (known !== undefined) return known
  return /^u[A-Z]|^u[mgs]$/u.test(written) ? `µ${written.slice(1)}` : written
}
