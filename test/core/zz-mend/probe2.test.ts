import { it } from 'vitest'
import { READINGS_DEFAULTS } from '../../../core/plan'
import { compareReadings } from '../../../core/tank'
import { PLAIN } from '../pulse/plans'
import { NO_ROW } from '../tank/readings/made'
const SLOW: any = { ...PLAIN, programme: { ...PLAIN.programme, shape: 'half-sine', peakSpeed: 0.1 } }
const go = (rows: any[], fit: any) => {
  try {
    const r = compareReadings({ section: { ...READINGS_DEFAULTS, rows, fit }, pulse: SLOW, ageing: 'auto', walls: null, water: null, train: null, meanThrust: null, leak: 0, fields: null })
    return JSON.stringify({ s: r.status, m: r.message, fit: r.fit, held: r.held, perRun: r.perRun.map((p) => [p.run, p.status, p.message, p.fit, p.held.map((h) => h.name)]), notes: r.notes, verdicts: r.verdicts.map((v) => v.text), rms: r.residualRms, cor: r.correlation, rep: r.repeats })
  } catch (e: any) { return 'THROWN ' + e.message + (e.stack ?? '').split('\n').slice(1, 4).join('|') }
}
it('x', () => {
  const all = ['circulation', 'startTime', 'startPosition', 'radius', 'coreRadius']
  for (const fit of [all, ['circulation', 'startPosition'], ['circulation'], ['startPosition'], ['circulation', 'startTime', 'startPosition']])
    for (const [name, times, places, sig] of [
      ['at start', [0.63, 0.63, 0.63, 0.63], [0.02, 0.021, 0.022, 0.02], 1e-4],
      ['4 same place', [2, 3, 2, 3], [0.1, 0.1, 0.1, 0.1], null],
      ['4 same place+time', [2, 2, 2, 2], [0.1, 0.1, 0.1, 0.1], null],
      ['4 same time', [2, 2, 2, 2], [0.1, 0.11, 0.12, 0.13], null],
      ['8 same place', [2, 2.2, 2.4, 3, 2, 2.2, 2.4, 3], [0.1, 0.1, 0.1, 0.1, 0.1, 0.1, 0.1, 0.1], null],
      ['8 same place sig', [2, 2.2, 2.4, 3, 2, 2.2, 2.4, 3], [0.1, 0.1, 0.1, 0.1, 0.1, 0.1, 0.1, 0.1], 1e-4],
      ['8 same all', [2, 2, 2, 2, 2, 2, 2, 2], [0.1, 0.1, 0.1, 0.1, 0.1, 0.1, 0.1, 0.1], null],
      ['backwards', [2, 2.2, 2.4, 3, 2, 2.2, 2.4, 3], [0.3, 0.2, 0.1, 0.05, 0.3, 0.2, 0.1, 0.05], null],
    ] as any[]) {
      const rows = times.map((time: number, k: number) => ({ ...NO_ROW, run: k < times.length / 2 ? 'a' : 'b', time, x: places[k], sigmaX: sig }))
      console.log('###', name, fit.join(), '\n', go(rows, fit).slice(0, 1500))
    }
})
