import { computePulse } from '../../../core/pulse'
import { pulseScene, type PulseSceneModel } from '../../../core/report'
import { atStrokeRatio, TUBE } from '../../core/pulse/plans'

const scenes = new Map<string, PulseSceneModel>()

/** The drawing of the plain pulse at a stroke ratio; computed once. */
export function sceneAt(strokeRatio: number, shape: 'tube' | 'converging' | 'orifice' = 'tube'): PulseSceneModel {
  const key = `${shape} ${strokeRatio}`
  const present = scenes.get(key)
  if (present !== undefined) return present
  const input = { ...atStrokeRatio(strokeRatio), nozzle: { ...TUBE, shape } }
  const model = pulseScene(computePulse(input), input.nozzle, { length: 'mm', speed: 'mm/s' })
  scenes.set(key, model)
  return model
}
