/** Sizing of a thruster: many designs on one core, the map of the page, and a whole search. */
import { compileDesigns, designMap, sizeThruster, type Design } from '../../core/thruster'
import { problemWith } from '../core/thruster/sizingProblem'
import { median, type Figure } from './measure'

const DESIGNS = 100_000
const RUNS = 5
const WARM_UP = 2
const SEARCHES = 3

const HOLD_AND_MOVE = problemWith({
  target: [
    { thrust: 1.5, share: 0.7 },
    { speed: 0.5, share: 0.3 },
  ],
})
const MOVE = problemWith({ target: [{ speed: 0.5, share: 1 }] })

/** CPU time of a job [ms]; the machine is shared, so the wall's clock is not asked. */
function cpuMilliseconds(from: NodeJS.CpuUsage): number {
  const { user, system } = process.cpuUsage(from)
  return (user + system) / 1000
}

/** Designs all over the ranges of a search, none like the one before. */
function designAt(i: number): Design {
  const share = (step: number) => ((i * step) % DESIGNS) / DESIGNS
  return {
    diameter: 0.01 + 0.07 * share(1),
    strokeRatio: 1 + 5 * share(7919),
    count: 1 + (i % 4),
    ejectShare: 0.3 + 0.4 * share(104_729),
    frequency: null,
  }
}

/** Median CPU time of pricing every design, and of a map of 60 x 60. @throws {Error} where no design is inside the limits */
function pricing(problem: typeof MOVE): { readonly designs: number; readonly map: number } {
  const compiled = compileDesigns(problem)
  const times: number[] = []
  const maps: number[] = []
  for (let run = 0; run < WARM_UP + RUNS; run++) {
    let inside = 0
    const start = process.cpuUsage()
    for (let i = 0; i < DESIGNS; i++) if (compiled.evaluate(designAt(i)).violation === 0) inside++
    const time = cpuMilliseconds(start)
    if (inside === 0) throw new Error('no design held its limits')
    const mapStart = process.cpuUsage()
    designMap(compiled, designAt(1234))
    if (run < WARM_UP) continue
    times.push(time)
    maps.push(cpuMilliseconds(mapStart))
  }
  return { designs: median(times) / 1000, map: median(maps) }
}

export async function thrusterFigures(): Promise<readonly Figure[]> {
  const one = pricing(MOVE)
  const two = pricing(HOLD_AND_MOVE)
  const searches: number[] = []
  for (let i = 0; i < SEARCHES; i++) {
    const start = process.cpuUsage()
    const { candidates, message } = await sizeThruster(HOLD_AND_MOVE)
    if (candidates.length === 0) throw new Error(message)
    searches.push(cpuMilliseconds(start) / 1000)
  }
  const goal = { atMost: 1 }
  return [
    { name: '100 000 thruster designs, one core', value: one.designs, unit: 's', n: RUNS, goal },
    { name: '100 000 thruster designs, two duty points', value: two.designs, unit: 's', n: RUNS, goal },
    { name: 'thruster map, 60 x 60, two duty points', value: two.map, unit: 'ms', n: RUNS, goal: { atMost: 200 } },
    { name: 'thruster search, candidates and front', value: median(searches), unit: 's', n: SEARCHES, goal: null },
  ]
}
