/** The answer to "why?" beside every figure of a thruster. */
import { FURTHER_THRUSTER_EXPLANATIONS } from './explanationsThrusterFurther'
import { formula, over, power, row, sub } from './mathml'
import {
  figure,
  present,
  pulseVerdict,
  SLUG_PULSES,
  value,
  type ThrusterExplanationContext,
  type ThrusterExplanationMaker,
} from './thrusterExplanationParts'
import type { Explanation } from './types'

const meanThrust: ThrusterExplanationMaker = (context) => {
  const { section, water, thruster } = context
  const [low, high] = thruster.meanThrustRange
  return {
    title: 'Mean thrust',
    mathml: formula('T = n f (', 'I cos θ −', 'ρ A L V', '( 1 − s )', ')'),
    formula:
      'Thrusters times frequency times the impulse of a pulse along the way, less the momentum that the water taken in loses: density, exit area, stroke, speed, and the share not recovered.',
    values: present(
      value('thrusters n', section.count),
      value('frequency f', thruster.frequency, 'Hz'),
      value('thrust per pulse of one', thruster.thrustPerPulse, 'N s'),
      value('impulse I of a pulse', thruster.pulse.total.impulse, 'N s'),
      value('density ρ', water.density, 'kg/m³'),
      value('speed V', thruster.speed, 'm/s'),
      value('recovered share s', section.intake.recoveredShare),
      value('lowest', low, 'N'),
      value('highest', high, 'N'),
    ),
    source: `Momentum balance over one period. Low end: the slug alone, less what close nozzles cost (Athanassiadis & Hart 2016, arXiv 1604.05382). High end: with the over-pressure of a quick start (Krueger 2005, J. Fluid Mech. 545:427).`,
    mark: 'published',
    range: SLUG_PULSES,
    ...pulseVerdict(
      context,
      figure(low) === figure(high)
        ? `${figure(low)} N.`
        : `${figure(low)} to ${figure(high)} N, ${figure(thruster.meanThrust)} N adopted.`,
    ),
  }
}

const speed: ThrusterExplanationMaker = ({ section, thruster }) => {
  const held = section.vehicle?.speed ?? null
  const jumpy = (thruster.cruise?.speeds.length ?? 0) > 1
  return {
    title: held === null ? 'Cruise speed' : 'Vehicle speed',
    mathml: formula('T ( V ) =', sub('F', 'drag'), '( V )'),
    formula: 'The lowest stable speed at which mean thrust and drag are equal; from rest the vehicle comes no further.',
    values: present(
      value('mean thrust there', thruster.meanThrust, 'N'),
      value('drag there', thruster.dragAtSpeed, 'N'),
      ...(thruster.cruise?.speeds ?? []).map((root, i) =>
        value(`crossing ${i + 1}${root.stable ? '' : ', unstable'}`, root.speed, 'm/s'),
      ),
    ),
    source:
      section.vehicle?.drag?.kind === 'hull'
        ? 'Balance of thrust and drag; friction by the ITTC 1957 line with a form factor.'
        : 'Balance of thrust and drag as given.',
    mark: 'identity',
    range: 'Steady mean speed: what one pulse changes is small against it.',
    inside: held === null && !jumpy,
    verdict:
      held === null
        ? jumpy
          ? 'Several speeds balance: which one is kept depends on how the vehicle got there.'
          : 'Inside: one speed balances.'
        : 'The speed is held by the plan, whatever the balance says.',
  }
}

const totalPower: ThrusterExplanationMaker = (context) => {
  const { section, thruster } = context
  const { jet, nozzleLoss, refill, column, carried, total } = thruster.power
  return {
    title: 'Total power',
    mathml: formula(
      'P =',
      over(
        row(
          ...[sub('P', 'jet'), '+', sub('P', 'loss'), '+', sub('P', 'refill'), '+', sub('P', 'column')],
          ...(carried > 0 ? ['+', sub('P', 'carried')] : []),
        ),
        'η',
      ),
    ),
    formula:
      'Kinetic energy of the jets, loss of the nozzle, head and loss of the intake, and the water in the nozzle that is set going at every pulse, over the efficiency of the actuator. Beyond a recovered share s of 1/2 the energy of the water that is carried along comes on top: ( 2 s − 1 ) ½ ρ Q V².',
    values: present(
      value('jet', jet, 'W'),
      value('nozzle loss', nozzleLoss, 'W'),
      value('refill', refill, 'W'),
      value('water in the nozzle', column, 'W'),
      value('water carried along', carried > 0 ? carried : null, 'W'),
      value('actuator efficiency η', section.actuator.efficiency),
      value('total', total, 'W'),
    ),
    source: 'Energy balance over one period; braking the plunger gives nothing back.',
    mark: 'identity',
    range: SLUG_PULSES,
    ...pulseVerdict(
      context,
      `${figure(total)} W for all ${section.count === 1 ? 'of one thruster' : `${section.count} thrusters`}.`,
    ),
  }
}

const froude: ThrusterExplanationMaker = ({ section, thruster }) => ({
  title: 'Froude efficiency',
  mathml: formula(
    sub('η', 'F'),
    '=',
    over('T V', row(sub('P', 'jet'), '+ ( 2 s − 1 )', over('1', '2'), 'ρ Q', power('V', '2'))),
  ),
  formula:
    'Thrust times speed over the power the water gets: the jet’s, with what the water taken in brings along or costs. Losses of nozzle, intake and actuator are not in it.',
  values: present(
    value('mean thrust T', thruster.meanThrust, 'N'),
    value('speed V', thruster.speed, 'm/s'),
    value('jet power', thruster.power.jet, 'W'),
    value('recovered share s', section.intake.recoveredShare),
    value('mean flow Q of all', thruster.flow, 'm³/s'),
    value('Froude efficiency', thruster.froudeEfficiency),
  ),
  source: 'Energy left in still water against work done; at constant speed 2 V / (U + V), Froude’s law (textbook).',
  mark: 'identity',
  range: 'Under way. It says how good the jet is, not how much the battery gives: that is the overall efficiency.',
  inside: thruster.froudeEfficiency !== null,
  verdict:
    thruster.froudeEfficiency === null
      ? 'There is none at rest or without thrust.'
      : `${figure(100 * thruster.froudeEfficiency)} % of what the water gets moves the vehicle.`,
})

const overall: ThrusterExplanationMaker = ({ thruster }) => ({
  title: 'Overall efficiency',
  mathml: formula('η =', over('T V', 'P')),
  formula: 'Thrust times speed over the total power put into the actuators.',
  values: present(
    value('mean thrust T', thruster.meanThrust, 'N'),
    value('speed V', thruster.speed, 'm/s'),
    value('total power P', thruster.power.total, 'W'),
    value('overall efficiency', thruster.overallEfficiency),
  ),
  source: 'Definition.',
  mark: 'identity',
  range: 'Under way. Every loss told in the power budget is in it.',
  inside: thruster.overallEfficiency !== null,
  verdict:
    thruster.overallEfficiency === null
      ? 'There is none at rest or without thrust.'
      : `${figure(100 * thruster.overallEfficiency)} % of the power moves the vehicle.`,
})

const thrustRatio: ThrusterExplanationMaker = (context) => {
  const { thruster } = context
  return {
    title: 'Against a steady jet',
    mathml: formula(over('T', row('n ρ A', power(row('( f L )'), '2')))),
    formula:
      'Mean thrust of one thruster over the momentum flux of a steady jet of the same mean flow through the same exit.',
    values: present(
      value('steady jet', thruster.steadyJetThrust, 'N'),
      value('ratio', thruster.thrustRatio),
      value('duty cycle', thruster.duty),
    ),
    source:
      'Definition. Pulses give more thrust from the same flow because they leave faster, and cost more energy for it.',
    mark: 'identity',
    range: 'A comparison at equal flow, not at equal power.',
    ...pulseVerdict(context, `${figure(thruster.thrustRatio)} times the steady jet.`),
  }
}

const costOfTransport: ThrusterExplanationMaker = ({ section, thruster }) => ({
  title: 'Cost of transport',
  mathml: formula(over('P', 'm g V')),
  formula: 'Total power over the weight of the vehicle in air and its speed.',
  values: present(
    value('total power P', thruster.power.total, 'W'),
    value('mass m', section.vehicle?.mass ?? null, 'kg'),
    value('speed V', thruster.speed, 'm/s'),
    value('cost of transport', thruster.costOfTransport),
  ),
  source: 'Definition, as used for animals and vehicles.',
  mark: 'identity',
  range: 'Propulsion only: what instruments and computers draw is not in it.',
  inside: thruster.costOfTransport !== null,
  verdict: 'It compares vehicles of different size at their own speeds.',
})

const endurance: ThrusterExplanationMaker = ({ section, thruster }) => ({
  title: 'Endurance and range',
  mathml: formula('t =', over('E', 'P'), ', x = V t'),
  formula: 'Energy on board for the thrusters over the total power; the way is that time at the speed.',
  values: present(
    value('energy store E', section.energyStore, 'J'),
    value('total power P', thruster.power.total, 'W'),
    value('endurance', thruster.endurance, 's'),
    value('range', thruster.range, 'm'),
  ),
  source: 'Definition.',
  mark: 'identity',
  range: 'The whole store goes to the thrusters, at this one speed.',
  inside: thruster.endurance !== null,
  verdict: 'Leave room for instruments, cold batteries and the way home.',
})

export const THRUSTER_EXPLANATIONS = {
  meanThrust,
  speed,
  totalPower,
  froude,
  overall,
  thrustRatio,
  costOfTransport,
  endurance,
  ...FURTHER_THRUSTER_EXPLANATIONS,
} as const
export type ThrusterExplanationId = keyof typeof THRUSTER_EXPLANATIONS
export const THRUSTER_EXPLANATION_IDS: readonly ThrusterExplanationId[] = Object.keys(THRUSTER_EXPLANATIONS).filter(
  (id): id is ThrusterExplanationId => id in THRUSTER_EXPLANATIONS,
)

/** The explanation of one figure of a thruster. */
export function explainThruster(id: ThrusterExplanationId, context: ThrusterExplanationContext): Explanation {
  return { id, ...THRUSTER_EXPLANATIONS[id](context) }
}
