import type { PlotModel } from '../../../core/report'

const X = Array.from({ length: 41 }, (_, i) => i / 10)

/** A plot with everything a plot can have, and text that has to be escaped. */
export const PLOT: PlotModel = {
  id: 'test plot',
  title: 'Energy & "loss"',
  x: { title: 'Formation time', unit: '', min: 0, max: 5 },
  y: { title: 'Energy', unit: 'mJ' },
  series: [
    { id: 'a', name: 'a < b', x: X, y: X.map((x) => x * x), role: 'primary', line: 'solid', filled: true },
    {
      id: 'b',
      name: 'second',
      x: X,
      y: X.map((x) => (x < 1 ? null : 3 * x)),
      role: 'secondary',
      line: 'dashed',
      filled: false,
    },
  ],
  bands: [{ axis: 'x', from: 3.6, to: 4.5, label: 'published band' }],
  lines: [{ axis: 'y', value: 0.33, label: 'limit 0.33', kind: 'limit' }],
}
