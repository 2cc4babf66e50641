import { Window } from 'happy-dom'
import { describe, expect, it } from 'vitest'
import { documentBody, documentHtml, type PrintDocument } from '../../../core/report'

const HOSTILE = '<script>alert("x")</script> & \u0007'

const sample: PrintDocument = {
  kind: 'Design record',
  title: HOSTILE,
  titleBlock: [['Date', '2030-01-02']],
  blocks: [
    { kind: 'heading', text: HOSTILE },
    { kind: 'subheading', text: 'Water' },
    { kind: 'paragraph', text: HOSTILE, tone: 'limit' },
    { kind: 'list', items: [HOSTILE, 'b'] },
    { kind: 'checklist', items: ['guard closed', HOSTILE] },
    {
      kind: 'table',
      caption: 'Stations',
      columns: [{ title: 'Station' }, { title: 'Time', numeric: true }],
      rows: [
        ['1', HOSTILE],
        ['2', '3.2'],
      ],
    },
    { kind: 'pairs', rows: [[HOSTILE, HOSTILE]] },
    { kind: 'figure', svg: '<svg viewBox="0 0 1 1"></svg>', caption: HOSTILE },
    { kind: 'boxes', labels: ['Prepared by', 'Checked by'] },
    { kind: 'lines', label: 'Notes', count: 3 },
    { kind: 'pageBreak' },
  ],
  foot: HOSTILE,
}

function parsed(html: string) {
  const window = new Window()
  window.document.write(html)
  return window.document
}

describe('printable documents', () => {
  it('show hostile texts as texts: no element of theirs enters the page', () => {
    const page = parsed(documentHtml(sample, 'A4'))
    expect(page.querySelectorAll('script')).toHaveLength(0)
    expect(page.querySelector('h1')?.textContent).toBe('<script>alert("x")</script> & ')
    expect(page.querySelector('td:nth-child(2)')?.textContent).toBe('<script>alert("x")</script> & ')
  })

  it('close every tag: the foot is a child of the article after all kinds of blocks', () => {
    const page = parsed(documentHtml(sample, 'A4'))
    expect(page.querySelector('article > footer')).not.toBeNull()
    expect(page.querySelectorAll('article > *')).toHaveLength(sample.blocks.length + 2)
  })

  it('set the page for A4 and Letter and load nothing', () => {
    expect(documentHtml(sample, 'A4')).toContain('@page{size:A4')
    expect(documentHtml(sample, 'Letter')).toContain('@page{size:letter')
    expect(documentHtml(sample, 'A4')).not.toMatch(/(?:src|href)=/u)
  })

  it('give every box to tick an item of its own and every table a head', () => {
    const page = parsed(documentBody(sample))
    expect(page.querySelectorAll('ul.ticks li')).toHaveLength(2)
    expect(page.querySelectorAll('thead th[scope=col]')).toHaveLength(2)
    expect(page.querySelectorAll('tbody tr')).toHaveLength(2)
  })
})
