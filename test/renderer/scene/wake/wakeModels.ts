import { circleNodes } from '../../../support/wakes'
import type { RingShape } from '../../../../core/filament'
import { wakeScene, type WakeSceneModel } from '../../../../core/report'
import { planOf } from '../../../support/plans'
import { manyRings, manyRingsWake, straightPath, wakeOfPaths } from '../../../support/wakes'

const UNITS = { length: 'mm', speed: 'mm/s' }

/** Twenty rings with shapes of their own. */
export function manyScene(): WakeSceneModel {
  const rings = manyRings()
  return wakeScene({ rings, wake: manyRingsWake(rings) }, planOf(), UNITS)
}

/** Two coaxial rings from a nozzle with a wall, a tube and stations around. */
export function pairScene(): WakeSceneModel {
  const times = Float64Array.from({ length: 11 }, (_, k) => k / 10)
  const rings = [0, 0.06].map((x) => ({ ...ringAt(x), core: 'uniform' as const }))
  const wake = wakeOfPaths(
    times,
    rings.map((ring) => straightPath(ring, times, (k) => ring.centre[0] + 0.01 * k)),
  )
  const around = { stations: [0.1], tube: 0.08, wall: { point: [0.25, 0, 0], normal: [-1, 0, 0] } }
  return wakeScene({ rings, wake }, planOf({ wake: around }), UNITS)
}

function ringAt(x: number) {
  const [centre, direction] = [[x, 0, 0] as const, [1, 0, 0] as const]
  return { circulation: 0.006, radius: 0.02, coreRadius: 0.004, centre, direction }
}

/** A ring about x. */
export function shapeAt(number: number, x: number, nodes = 64, radius = 0.02): RingShape {
  const centre = [x, 0, 0] as const
  return { ...ringAt(x), number, radius, nodes: circleNodes(centre, radius, nodes), speed: 0.1, centre }
}
