/** Every caution that holds, in groups; a sentence that all of a group end with stands once, above them. */
import type { Caution } from '../../plan'
import type { DocumentBlock } from '../document/types'

const GROUPS: readonly (readonly [group: Caution['group'], title: string])[] = [
  ['model', 'What the models do not tell'],
  ['machine', 'A machine that moves'],
  ['laboratory', 'Laboratory'],
  ['vehicle', 'Vehicle and bench'],
]

export function cautionBlocks(cautions: readonly Caution[]): readonly DocumentBlock[] {
  if (cautions.length === 0) return []
  return [
    { kind: 'heading', text: 'Cautions' },
    ...GROUPS.flatMap(([group, title]): DocumentBlock[] => {
      const all = cautions.filter((caution) => caution.group === group)
      if (all.length === 0) return []
      const shared = sharedEnd(all.map(({ text }) => text))
      const sources = new Set(all.map(({ source }) => source))
      const [source] = sources.size === 1 ? sources : []
      const lead = [
        ...(shared === '' ? [] : [`For each of these: ${shared}`]),
        ...(source === undefined ? [] : [`Source: ${source}.`]),
      ]
      return [
        { kind: 'subheading', text: title },
        ...(lead.length === 0 ? [] : [{ kind: 'paragraph', tone: 'small', text: lead.join(' ') } as const]),
        {
          kind: 'list',
          items: all.map((caution) => {
            const text = caution.text.slice(0, caution.text.length - shared.length).trimEnd()
            return source === undefined ? `${text} (${caution.source})` : text
          }),
        },
      ]
    }),
  ]
}

/** The last sentence, where several texts share it; '' else. */
function sharedEnd(texts: readonly string[]): string {
  const [first = ''] = texts
  const end = /(?<=[.!?] )[A-Z][^.!?]*\.$/u.exec(first)?.[0] ?? ''
  return texts.length > 1 && end !== '' && texts.every((text) => text.endsWith(` ${end}`)) ? end : ''
}
