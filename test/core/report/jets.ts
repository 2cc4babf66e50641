import { startingJetEnsemble, type JetEnsemble } from '../../../core/coaxial'
import { loadKernel } from '../../../core/kernel'
import { computePulse, type PulseResult } from '../../../core/pulse'
import { atStrokeRatio } from '../pulse/plans'
import { DIAMETER, JET, ramped } from '../coaxial/jet/jets'

/** One coarse jet at a stroke ratio: half a second at 8. */
export async function jetAt(strokeRatio: number, delta = 0.12): Promise<JetEnsemble> {
  const { density, kinematicViscosity, axialFlow } = JET
  return await startingJetEnsemble(
    {
      density,
      kinematicViscosity,
      axialFlow,
      diameter: DIAMETER,
      programme: ramped(strokeRatio),
      coreGrowth: true,
      ensemble: false,
      delta,
    },
    { kernel: await loadKernel() },
  )
}

/** The pulse of the same tube and programme. */
export function pulseAt(strokeRatio: number): PulseResult {
  const plan = atStrokeRatio(strokeRatio)
  return computePulse({
    ...plan,
    density: JET.density,
    kinematicViscosity: JET.kinematicViscosity,
    nozzle: { ...plan.nozzle, diameter: DIAMETER, pistonDiameter: DIAMETER },
    programme: ramped(strokeRatio),
  })
}
