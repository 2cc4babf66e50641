/**
 * Many designs priced: what a choice of nozzle, stroke and number of thrusters costs at every duty point.
 *
 * A design keeps the shape of the plan's programme with the shares of its ramps, and the proportions of its nozzle: plunger and
 * length grow with the exit. The stroke takes all the time its eject share leaves, so the peak speed follows from stroke and time.
 *
 * Nozzle, number and eject share are common to all duty points. The frequency is set at each to just give its thrust with the full
 * stroke; where that is slower than the search allows, the slowest frequency is kept and the stroke shortened. Both have a closed
 * form, since impulse times duration does not change with the frequency. Every figure told comes from `vehicleBudget`.
 */
import { bracketedRoot } from '../base'
import { compileProgramme, exitFactors } from '../pulse'
import { vehicleBudget, type BudgetSetting } from './budget'
import { findCruise } from './cruise'
import { dutyDemands, requireProblem } from './designDemands'
import { frequencyFor, strokeFor, strokeForce } from './designForce'
import { violationOf } from './designLimits'
import { DesignRings, NO_START, scaledStart, type ComputedStart } from './designRing'
import { scaledMoments } from './designStroke'
import type { Design, DesignFigures, DesignProblem, DutyDemand, HeldPoint, PointFigures } from './designTypes'
import { compileDrag, type DragLaw } from './drag'
import { above, atLeast, atMost, mechanicalLimits } from './limits'
import { budgetSetting } from './setting'
import { programmeMoments, type StrokeMoments } from './shapeMoments'
import type { Limit, Span } from './types'

export interface DesignOptions {
  /** True: a stroke past the adopted formation number counts as a broken limit; otherwise its margin is only told. */
  readonly holdFormationNumber?: boolean
}

/** A problem made ready: each design then costs microseconds. */
export interface CompiledDesigns {
  readonly problem: DesignProblem
  readonly demands: readonly DutyDemand[]
  /** Moments of the plan's own stroke, whose shape every design keeps. */
  readonly planMoments: StrokeMoments
  readonly start: ComputedStart
  /** A design at every duty point; its values positive and finite, the ranges of the search are not asked of it. */
  readonly evaluate: (design: Design) => DesignFigures
  /** One thruster with everything held, at the speed of the vehicle and with the thrust asked for of a duty point. */
  readonly evaluateHeld: (held: HeldPoint, speed: number, thrustAsked: number | null) => PointFigures
}

/** Least time that is reckoned for a stroke, as a share of the period: a pulse without time breaks its eject time. */
const LEAST_TIME = 1e-3
/** Share of the room to vapour pressure kept for the tables of rings: they are good to this. */
const TABLE_ERROR = 2e-3
/** Share of the room to vapour pressure below which the bound of the core's pressure will do. */
const FAR_FROM_BOILING = 0.9

/**
 * Check a problem and make it ready.
 *
 * @throws {DomainError} on thruster.…, nozzle…, programme… or water…
 */
export function compileDesigns(problem: DesignProblem, options: DesignOptions = {}): CompiledDesigns {
  requireProblem(problem)
  const { pulse } = problem
  const planMoments = programmeMoments(compileProgramme(pulse.programme), pulse.programme)
  const evaluator = new Evaluator(problem, planMoments, options.holdFormationNumber ?? false)
  return {
    problem,
    demands: evaluator.demands,
    planMoments,
    start: evaluator.start,
    evaluate: (design) => evaluator.evaluate(design),
    evaluateHeld: (held, speed, asked) => evaluator.price(held, speed, asked, true),
  }
}

class Evaluator {
  readonly demands: readonly DutyDemand[]
  readonly start: ComputedStart
  private readonly drag: DragLaw | null
  private readonly setting: BudgetSetting
  private readonly frequencies: Span
  private readonly pistonRatio: number
  private readonly lengthRatio: number
  private readonly rings: DesignRings
  private readonly pressureRoom: number | null

  constructor(
    private readonly problem: DesignProblem,
    private readonly planMoments: StrokeMoments,
    private readonly holdFormationNumber: boolean,
  ) {
    const { pulse, section, absolutePressure, vapourPressure } = problem
    const { density, kinematicViscosity, nozzle } = pulse
    const drag = section.vehicle?.drag ?? null
    this.drag = drag === null ? null : compileDrag(drag, density, kinematicViscosity, section.vehicle?.length ?? null)
    this.demands = dutyDemands(section, this.drag)
    this.setting = budgetSetting(section, pulse, 1, 0, exitFactors(nozzle))
    this.frequencies = section.search?.frequency ?? [0, Infinity]
    this.pistonRatio = nozzle.pistonDiameter / nozzle.diameter
    this.lengthRatio = nozzle.length / nozzle.diameter
    this.start = startOfPlan(problem, planMoments)
    this.rings = new DesignRings(pulse, planMoments, this.start)
    this.pressureRoom = vapourPressure === null ? null : absolutePressure - vapourPressure
  }

  evaluate(design: Design): DesignFigures {
    const { diameter, strokeRatio, count } = design
    const stroke = strokeRatio * diameter
    const points: PointFigures[] = []
    let power = 0
    let violation = 0
    for (const demand of this.demands) {
      const point = this.point(design, stroke, demand)
      points.push(point)
      power += demand.share * point.budget.power.total
      violation += point.violation
    }
    return {
      design,
      points,
      power,
      thrust: points[0]?.budget.meanThrust ?? 0,
      sweptVolume: count * (Math.PI / 4) * diameter * diameter * stroke,
      violation,
    }
  }

  /**
   * Everything held: the one way to figures and limits.
   *
   * @param inFull false: a core pressure that is far from boiling is only bounded
   */
  price(held: HeldPoint, speed: number, asked: number | null, inFull: boolean): PointFigures {
    const { problem, setting } = this
    const { diameter, pistonDiameter, frequency } = held
    const allowed = held.ejectShare / frequency - setting.valveLag
    const moments = scaledMoments(this.planMoments, held.stroke, Math.max(allowed, LEAST_TIME / frequency))
    const budget = vehicleBudget(moments, this.settingOf(held, moments, speed))
    const { absolutePressure, vapourPressure, section } = problem
    const { actuator, bay } = section
    const limits = mechanicalLimits(budget, { diameter, pistonDiameter, duration: moments.duration }, actuator, bay)
    if (asked !== null) limits.push(...atLeast('thrust', budget.meanThrust, asked))
    this.addRingLimits(limits, held, moments, speed, inFull)
    if (this.pressureRoom !== null)
      limits.push(...above('intake cavitation', absolutePressure - budget.intakeSuction, vapourPressure))
    const scales = { period: 1 / frequency, pressure: this.pressureRoom ?? 1 }
    return {
      speed,
      thrustAsked: asked,
      held,
      peakSpeed: moments.peakSpeed,
      duration: moments.duration,
      budget,
      moments,
      limits,
      violation: violationOf(limits, scales),
    }
  }

  private point(design: Design, fullStroke: number, demand: DutyDemand): PointFigures {
    const { diameter, count, ejectShare } = design
    const pistonDiameter = diameter * this.pistonRatio
    const common = { diameter, pistonDiameter, ejectShare, count }
    const { speed, thrust } = demand
    if (design.frequency !== null || thrust === null || speed === null) {
      const held = { ...common, stroke: fullStroke, frequency: design.frequency ?? this.frequencies[0] }
      return this.price(held, speed ?? this.cruise(held), thrust, false)
    }
    const { setting, frequencies } = this
    const [slowest, fastest] = frequencies
    const force = strokeForce(this.planMoments, setting, this.start.impulse, diameter, speed)
    const timing = { ejectShare, valveLag: setting.valveLag }
    const frequency = frequencyFor(force, thrust / count, fullStroke, timing)
    if (frequency >= slowest)
      return this.price(
        { ...common, stroke: fullStroke, frequency: Math.min(frequency, fastest) },
        speed,
        thrust,
        false,
      )
    const stroke = Math.min(fullStroke, strokeFor(force, thrust / count, slowest, timing))
    return this.price({ ...common, stroke, frequency: slowest }, speed, thrust, false)
  }

  private settingOf(held: HeldPoint, moments: StrokeMoments, speed: number): BudgetSetting {
    const { setting } = this
    const { diameter, pistonDiameter, frequency, count, ejectShare } = held
    return {
      ...setting,
      diameter,
      pistonDiameter,
      nozzleLength: diameter * this.lengthRatio,
      computedBeyondSlug:
        setting.overPressure === 'computed'
          ? scaledStart(this.start, setting.density, diameter, moments.peakSpeed)
          : null,
      speed,
      frequency,
      count,
      ejectShare,
    }
  }

  /** Pressure in the core, and the formation number where it is held. */
  private addRingLimits(
    limits: Limit[],
    held: HeldPoint,
    moments: StrokeMoments,
    speed: number,
    inFull: boolean,
  ): void {
    const { absolutePressure, vapourPressure } = this.problem
    const { rings, pressureRoom: room } = this
    if (room !== null) {
      const most = rings.coreDropAtMost(held.diameter, moments)
      const drop = inFull || !(most < FAR_FROM_BOILING * room) ? rings.coreDrop(held.diameter, moments, speed) : most
      if (drop !== null)
        limits.push(...above('core cavitation', absolutePressure - drop * (1 + TABLE_ERROR), vapourPressure))
    }
    if (!this.holdFormationNumber) return
    const strokeRatio = held.stroke / held.diameter
    limits.push(...atMost('formation number', strokeRatio, rings.adopted(strokeRatio, speed / moments.peakSpeed)))
  }

  /** Speed at which thrust meets drag, as the full analysis finds it; the thrust falls in a straight line with speed. */
  private cruise(held: HeldPoint): number {
    const { drag } = this
    if (drag === null) return 0
    const allowed = held.ejectShare / held.frequency - this.setting.valveLag
    const moments = scaledMoments(this.planMoments, held.stroke, Math.max(allowed, LEAST_TIME / held.frequency))
    const rest = vehicleBudget(moments, this.settingOf(held, moments, 0)).meanThrust
    const fall = rest - vehicleBudget(moments, this.settingOf(held, moments, 1)).meanThrust
    if (!(rest > 0)) return 0
    const end = fall > 0 ? rest / fall : Infinity
    const thrustAt = (speed: number): number => rest - fall * speed
    // A table may meet the thrust more than once; a formula rises all the way.
    if (drag.knots.length > 0) {
      const { fromRest, searchedTo } = findCruise(thrustAt, drag, end)
      // Past the end of the table: the fastest that is known.
      return fromRest ?? searchedTo
    }
    const excess = (speed: number): number => thrustAt(speed) - drag.dragAt(speed)
    let high = Number.isFinite(end) ? end : 1
    while (excess(high) > 0) high *= 2
    return bracketedRoot(excess, 0, high) ?? 0
  }
}

/** What the plan's computed jet holds beyond its slug, freed of its size and speed. */
function startOfPlan({ pulse }: DesignProblem, moments: StrokeMoments): ComputedStart {
  const { jet, density, nozzle, overPressure } = pulse
  if (jet === null || overPressure !== 'computed') return NO_START
  const unit = scaledStart({ circulation: 1, impulse: 1, energy: 1 }, density, nozzle.diameter, moments.peakSpeed)
  return {
    circulation: jet.circulationBeyondSlug / unit.circulation,
    impulse: jet.impulseBeyondSlug / unit.impulse,
    energy: jet.energyBeyondSlug / unit.energy,
  }
}
