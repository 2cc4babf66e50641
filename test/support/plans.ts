import { readPlan, type Plan } from '../../core/plan'

/** A plan from a partial document: format and version are added, and the three needed sections unless given. */
export function planOf(parts: Readonly<Record<string, unknown>> = {}): Plan {
  const reading = readPlan(JSON.stringify(documentOf(parts)))
  if (!reading.ok) throw new Error(reading.problems.map((problem) => problem.message).join('\n'))
  return reading.plan
}

export function documentOf(parts: Readonly<Record<string, unknown>> = {}): Record<string, unknown> {
  return {
    format: 'ringwright-plan',
    version: 1,
    water: { kind: 'fresh', temperatureCelsius: 20 },
    nozzle: { shape: 'tube', diameter: 0.03, pistonDiameter: 0.06 },
    programme: { shape: 'trapezoid', stroke: 0.096, peakSpeed: 0.2, riseTime: 0.04, fallTime: 0.04 },
    ...parts,
  }
}
