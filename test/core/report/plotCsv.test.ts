import { describe, expect, it } from 'vitest'
import { at } from '../../../core/base'
import { plotTable, plotToCsv } from '../../../core/report'
import { PLOT } from './models'

describe('the numbers behind a plot', () => {
  it('are CSV with a header of names and units, CRLF ends and empty cells for what is missing', () => {
    const lines = plotToCsv(PLOT).split('\r\n')
    // RFC 4180: a field with a comma or a quote is quoted, quotes are doubled.
    expect(lines[0]).toBe('Formation time,"Energy & ""loss"", a < b (mJ)","Energy & ""loss"", second (mJ)"')
    expect(lines[1]).toBe('0,0,')
    expect(lines[41]).toBe('4,16,12')
    expect(lines[42]).toBe('')
    expect(plotToCsv(PLOT)).not.toMatch(/NaN|[^\r]\n/)
  })

  it('read back to the same doubles', () => {
    const x = [0, 1 / 3, Math.PI]
    const model = { ...PLOT, series: [{ ...at(PLOT.series, 0), x, y: [0.1 + 0.2, 1e-17, 2 / 3] }] }
    const rows = plotToCsv(model).trimEnd().split('\r\n').slice(1)
    expect(rows.map((row) => row.split(',').map(Number))).toEqual([
      [0, 0.30000000000000004],
      [1 / 3, 1e-17],
      [Math.PI, 2 / 3],
    ])
  })

  it('keep both rows of a vertical step and merge series with other abscissae in order', () => {
    const first = at(PLOT.series, 0)
    const step = { ...PLOT, series: [{ ...first, x: [0, 0, 1], y: [0, 2, 2] }] }
    expect(plotTable(step).rows).toEqual([
      [0, 0],
      [0, 2],
      [1, 2],
    ])
    const merged = {
      ...PLOT,
      series: [
        { ...first, x: [0, 2], y: [1, 3] },
        { ...first, x: [1, 2], y: [5, 6] },
      ],
    }
    expect(plotTable(merged).rows).toEqual([
      [0, 1, null],
      [1, null, 5],
      [2, 3, 6],
    ])
  })
})
