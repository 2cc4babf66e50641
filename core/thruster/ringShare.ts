/**
 * How much of a pulse goes into its ring, and what a unit of work buys of it as the stroke grows.
 *
 * Beyond the formation number more stroke adds trailing jet, not ring. The trailing jet pushes as well, so the formation number
 * moves neither thrust nor power: what moves is the share of the ring.
 */
import { equallySpaced } from '../base'
import {
  compileProgramme,
  withStroke,
  type FormationNumbers,
  type ProgrammeInput,
  type PulseInput,
  type SpeedProgramme,
} from '../pulse'
import { vehicleBudget, type BudgetSetting } from './budget'
import { programmeMoments, shapeMoments, type StrokeMoments } from './shapeMoments'

/** Share of the slug's impulse that goes into the ring, at three formation numbers; null where there is none. */
export interface RingShare {
  /** At the low and at the high end of the formation numbers. */
  readonly low: number | null
  readonly high: number | null
  readonly adopted: number | null
}

/** Shares of the impulse of a stroke that lie before pinch-off, by the slug of the same programme cut there. */
export function ringShare(programme: SpeedProgramme, formation: FormationNumbers, diameter: number): RingShare {
  const share = (formationNumber: number | null): number | null => {
    if (formationNumber === null) return null
    const cut = formationNumber * diameter
    return cut >= programme.stroke ? 1 : programme.atStroke(cut).moments.square / programme.moments.square
  }
  return { low: share(formation.low), adopted: share(formation.adopted), high: share(formation.high) }
}

/** Ring impulse a joule of actuator work buys, over stroke ratio. */
export interface RingImpulseCurve {
  readonly strokeRatio: readonly number[]
  /** [N s/J] */
  readonly impulsePerWork: readonly number[]
  /** Stroke ratio at which it is largest; the longest of those that are alike, since at constant speed it is level until the ring is full. */
  readonly best: number
}

/** Stroke ratios of the curve. */
const FROM = 0.5
const TO = 10
const POINTS = 96
/** Values this close, relative, are one: rounding of sums must not choose among them. */
const ALIKE = 1e-9

/** Stroke ratios at which plunger thrusters gave most (Krieg, Coley, Hart & Mohseni 2005, conference), shown beside the curve. */
export const MEASURED_BEST_STROKE: readonly [number, number] = [4, 5.5]

/**
 * Ring impulse per work against stroke ratio: the programme at every stroke with its peak speed and ramps kept (a table stretches),
 * the share of the period that the stroke takes kept as well.
 *
 * @param pulse valid; its programme is varied
 * @param setting of the thruster; its frequency is that of the plan's own stroke
 * @param formationNumber adopted
 */
export function ringImpulsePerWork(
  pulse: Pick<PulseInput, 'programme' | 'nozzle'>,
  setting: BudgetSetting,
  formationNumber: number,
): RingImpulseCurve {
  const { nozzle, programme } = pulse
  const duty = setting.frequency * compileProgramme(programme).duration
  const strokeRatio = equallySpaced(FROM, TO, POINTS)
  const full = momentsAtStroke(programme, formationNumber * nozzle.diameter)
  const impulsePerWork = strokeRatio.map((ratio) => {
    const stroke = ratio * nozzle.diameter
    const moments = momentsAtStroke(programme, stroke)
    const frequency = duty / moments.duration
    // Two valve lags that no longer fit a short period would leave no time to refill: the curve is of the water's work.
    const budget = vehicleBudget(moments, { ...setting, frequency, count: 1, valveLag: 0 })
    const share = ratio <= formationNumber ? 1 : full.integralSpeedSquared / moments.integralSpeedSquared
    return (budget.impulse * share) / (budget.power.total / frequency)
  })
  const least = (1 - ALIKE) * Math.max(...impulsePerWork)
  const best = impulsePerWork.findLastIndex((value) => value >= least)
  return { strokeRatio, impulsePerWork, best: strokeRatio[best] ?? NaN }
}

function momentsAtStroke(programme: ProgrammeInput, stroke: number): StrokeMoments {
  if (programme.shape !== 'table') return shapeMoments(programme.shape, programme, stroke)
  const at = withStroke(programme, stroke)
  return programmeMoments(compileProgramme(at), at)
}
