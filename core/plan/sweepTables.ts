/**
 * A sweep written out: sweep.csv row by row.
 */
import { csvLine } from './csvWriter'
import { pathHeading } from './planPaths'
import type { Plan } from './types'
import type { SweepOutcome, SweepRow } from './variedTypes'

/** Results that are read where the plan names none, by the section that must stand in the plan. */
const USUAL = {
  pulse: [
    'pulse.formationNumber.adopted',
    'pulse.pinchedOff',
    'pulse.total.impulse',
    'pulse.ring.circulation',
    'pulse.ring.radius',
    'pulse.ring.speed',
  ],
  jet: ['jet.formationNumber', 'jet.ringCirculation'],
  wake: ['wake.passes', 'wake.validUntil'],
  thruster: ['thruster.meanThrust', 'thruster.power.total', 'thruster.speed', 'thruster.overallEfficiency'],
  tankRun: ['tankRun.pairInterval', 'tankRun.frameRate', 'tankRun.settlingTime'],
} as const

/** Summary paths that a sweep reads: those it names, or the usual ones of the sections that stand in the plan. */
export function sweepResults(plan: Plan): readonly string[] {
  const named = plan.sweep?.results ?? []
  if (named.length > 0) return named
  return [
    ...(plan.absent.length === 0 ? USUAL.pulse : []),
    ...(plan.jet === null ? [] : USUAL.jet),
    ...(plan.wake === null ? [] : USUAL.wake),
    ...(plan.thruster === null ? [] : USUAL.thruster),
    ...(plan.tankRun === null
      ? []
      : [...plan.tankRun.stations.map((_, i) => `tankRun.arrivals.${i}.time`), ...USUAL.tankRun]),
  ]
}

/** Header of sweep.csv: the number of the row, what is set with its SI unit, what is read, and whether it holds its limits. */
export function sweepColumns({ paths, results }: Pick<SweepOutcome, 'paths' | 'results'>): readonly string[] {
  return ['row', ...paths.map(pathHeading), ...results, 'feasible', 'limit']
}

/** One row as its line with the end of line. It is one line: a sentence in it has no line ends. */
export function sweepLine({ row, inputs, results, feasible, limit }: SweepRow): string {
  return csvLine([row, ...inputs, ...results, feasible, limit?.replace(/\s+/g, ' ') ?? null])
}

/** sweep.csv whole. */
export function sweepTable(outcome: SweepOutcome, rows: Iterable<SweepRow>): string {
  let text = csvLine(sweepColumns(outcome))
  for (const row of rows) text += sweepLine(row)
  return text
}
