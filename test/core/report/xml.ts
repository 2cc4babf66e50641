/**
 * A strict little reader for the XML we write: it throws where a document is not well formed.
 */

export interface XmlElement {
  readonly name: string
  readonly attributes: Record<string, string>
  readonly children: XmlElement[]
  text: string
}

const ENTITIES: Record<string, string> = { amp: '&', lt: '<', gt: '>', quot: '"', '#39': "'" }

function decoded(text: string): string {
  if (/[<>]/.test(text)) throw new Error(`a bare angle bracket in "${text}"`)
  return text.replace(/&([^;]*);|&/g, (whole, name: string | undefined) => {
    const letter = name === undefined ? undefined : ENTITIES[name]
    if (letter === undefined) throw new Error(`an entity that is not known: ${whole}`)
    return letter
  })
}

export function readXml(source: string): XmlElement {
  const document: XmlElement = { name: '', attributes: {}, children: [], text: '' }
  const open: XmlElement[] = [document]
  const pieces = /<(\/?)([A-Za-z][\w:-]*)((?:\s+[\w:-]+="[^"<]*")*)\s*(\/?)>|([^<]+)/gy
  let end = 0
  for (const match of source.matchAll(pieces)) {
    if (match.index !== end) throw new Error(`not well formed at ${source.slice(end, end + 60)}`)
    end = match.index + match[0].length
    const [, closing, name, attributes = '', empty, text] = match
    const parent = open[open.length - 1]
    if (parent === undefined) throw new Error('more closed than opened')
    if (text !== undefined) parent.text += decoded(text)
    else if (closing === '/') {
      if (parent.name !== name) throw new Error(`</${name}> closes <${parent.name}>`)
      open.pop()
    } else {
      const element: XmlElement = { name: name ?? '', attributes: {}, children: [], text: '' }
      for (const [, key = '', value = ''] of attributes.matchAll(/([\w:-]+)="([^"]*)"/g)) {
        if (key in element.attributes) throw new Error(`${key} twice in <${name}>`)
        element.attributes[key] = decoded(value)
      }
      parent.children.push(element)
      if (empty !== '/') open.push(element)
    }
  }
  if (end !== source.length) throw new Error(`not well formed at ${source.slice(end, end + 60)}`)
  const [root] = document.children
  if (open.length !== 1 || document.children.length !== 1 || root === undefined) throw new Error('not one closed root')
  return root
}

export interface WrittenText {
  readonly text: string
  readonly x: number
  readonly y: number
  readonly size: number
  readonly anchor: string
  readonly turned: boolean
}

/** Every `<text>` of an SVG. */
export function textsOf(root: XmlElement): WrittenText[] {
  const own: WrittenText[] =
    root.name === 'text'
      ? [
          {
            text: root.text,
            x: Number(root.attributes['x']),
            y: Number(root.attributes['y']),
            size: Number(root.attributes['font-size']),
            anchor: root.attributes['text-anchor'] ?? 'start',
            turned: root.attributes['transform'] !== undefined,
          },
        ]
      : []
  return [...own, ...root.children.flatMap(textsOf)]
}
