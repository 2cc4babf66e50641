import { describe, expect, it } from 'vitest'
import { noticesText, RULE } from '../../build/scripts/notices.mjs'
import { noticesIn, readNotices } from '../../renderer/model/about'

const FILE = noticesText(
  [
    { name: 'one', version: '1.0.0', identifier: 'MIT', text: 'Copyright (c) One\r\n\r\nTerms of one.\n' },
    {
      name: '@two/part',
      version: '2.3.4',
      identifier: 'ISC',
      text: `Copyright (c) Two\n${'='.repeat(9)}\nTerms of two.`,
    },
  ],
  { source: 'the data', paper: 'the paper', licence: ['MIT License', 'Copyright (c) the measurers'] },
)

const answering =
  (text: string, status = 200) =>
  async () =>
    new Response(text, { status })

describe('the notices', () => {
  it('come apart into what the build put together, in its order', () => {
    const notices = noticesIn(FILE)
    expect(notices.map(({ title }) => title)).toEqual([
      expect.stringMatching(/^Ringwright \d+\.\d+\.\d+ \(MIT\)$/),
      'one 1.0.0 (MIT)',
      '@two/part 2.3.4 (ISC)',
      'Numbers of a measured pulse (MIT)',
    ])
    expect(notices[0]?.text).toMatch(/^MIT License\n\nCopyright \(c\) \d{4} the Ringwright authors\n/)
    expect(notices[1]?.text).toBe('Copyright (c) One\n\nTerms of one.')
    expect(notices[2]?.text).toBe(`Copyright (c) Two\n${'='.repeat(9)}\nTerms of two.`)
    expect(notices[3]?.text).toBe(
      'Transcribed from the data. Described in the paper.\n\nMIT License\n\nCopyright (c) the measurers',
    )
  })

  it('say nothing of measured numbers where there are none', () => {
    expect(noticesText([], null).split(RULE)).toHaveLength(2)
  })

  it('are not made for a package whose terms are not known', () => {
    expect(() => noticesText([{ name: 'a', version: '1', identifier: 'MIT' }], null)).toThrow(
      /a 1 is bundled and cannot/,
    )
    expect(() => noticesText([{ name: 'a', version: '1', text: 'Terms.' }], null)).toThrow(/a 1 is bundled and cannot/)
  })

  it('are read from beside the page', async () => {
    expect(await readNotices(answering(FILE))).toHaveLength(4)
  })

  it.each([
    ['they are missing', answering('Not found.', 404)],
    ['a development server sends its page instead', answering('<!doctype html>')],
    ['the server is gone', () => Promise.reject(new TypeError('failed'))],
  ])('are a sentence where %s', async (_what, load) => {
    expect(await readNotices(load)).toMatch(/^The notices could not be read\./)
  })
})
