/** Why the further figures of a thruster are what they are: peaks, pressures, endurance, rings, moments. */
import { CLOSE_RINGS, MEASURED_BEST_STROKE } from '../thruster'
import { formula, over, power, row, sub } from './mathml'
import { figure, present, pulseVerdict, value, type ThrusterExplanationMaker } from './thrusterExplanationParts'

const peakThrust: ThrusterExplanationMaker = (context) => {
  const { thruster } = context
  return {
    title: 'Peak thrust and ripple',
    mathml: formula(over(row(sub('T', 'high'), '−', sub('T', 'low')), 'T')),
    formula: 'Highest thrust of all thrusters together in the period; ripple is highest less lowest over the mean.',
    values: present(
      value('peak thrust', thruster.peakThrust, 'N'),
      value('mean thrust', thruster.meanThrust, 'N'),
      value('ripple', thruster.ripple),
    ),
    source:
      'Momentum flux through exit and intake; over-pressure is spread over the stroke in proportion to the slug’s.',
    mark: 'own study',
    range: 'Forces that plunger and water exchange inside the vehicle come back within the period and are left out.',
    ...pulseVerdict(context, 'Thrusters that fire in turn share the ripple out.'),
  }
}

const cavity: ThrusterExplanationMaker = ({ thruster }) => {
  const { pressureHigh, pressureLow } = thruster.cavity
  const bounded = Number.isFinite(pressureHigh) && Number.isFinite(pressureLow)
  return {
    title: 'Cavity pressure',
    mathml: formula(
      'p =',
      over('ρ', '2'),
      '( k + K −',
      power(over('A', sub('A', 'c')), '2'),
      ')',
      power('U', '2'),
      '+ ρ l',
      over('d U', 'd t'),
    ),
    formula:
      'Head of the jet with the nozzle’s loss, less that of the plunger’s own speed, and the inertia of the water in the nozzle.',
    values: present(
      value('highest over outside', pressureHigh, 'Pa'),
      value('lowest against outside', pressureLow, 'Pa'),
      value('cavity volume', thruster.cavity.volume, 'm³'),
    ),
    source: 'Unsteady Bernoulli along the nozzle.',
    mark: 'identity',
    range: 'Flow loading only: not a calculation of a pressure vessel, its seals or its fatigue.',
    inside: bounded,
    verdict: bounded
      ? 'Inside: the speed has ramps of finite time.'
      : 'Outside: the speed jumps, and water in the nozzle then asks for pressure without bound.',
  }
}

const cavitationMargin: ThrusterExplanationMaker = ({ thruster }) => {
  const { cavitation } = thruster
  return {
    title: 'Cavitation margin',
    mathml: formula('min ( ', sub('p', 'core'), ',', sub('p', 'intake'), ') −', sub('p', 'v')),
    formula: 'The lower of the pressures in the core of the ring and behind the intake opening, over vapour pressure.',
    values: present(
      value('outside', cavitation.ambientPressure, 'Pa'),
      value('core of the ring', cavitation.corePressure, 'Pa'),
      value('intake', cavitation.intakePressure, 'Pa'),
      value('vapour pressure', cavitation.vapourPressure, 'Pa'),
    ),
    source: 'Pressure at the core by the steady family’s own flow; vapour pressure by IAPWS-IF97 or as given.',
    mark: 'own study',
    range:
      'Water that is free of gas and nuclei holds less often than it should: bubbles show before vapour pressure is reached.',
    inside: (thruster.cavitationMargin ?? -1) > 0,
    verdict:
      thruster.cavitationMargin === null
        ? 'No vapour pressure is given, so none can be told.'
        : thruster.cavitationMargin > 0
          ? `Inside: ${figure(thruster.cavitationMargin / 1000)} kPa are left.`
          : 'Outside: the water would boil.',
  }
}

const ringSpacing: ThrusterExplanationMaker = ({ thruster }) => ({
  title: 'Ring spacing',
  mathml: formula(over(row('(', sub('U', 'ring'), '+ V ) / f'), 'R')),
  formula: 'Way of a ring until the next one leaves, over the ring’s radius.',
  values: present(
    value('distance', thruster.ringSpacing?.distance ?? null, 'm'),
    value('ring radius', thruster.ringSpacing?.radius ?? null, 'm'),
    value('ratio', thruster.ringSpacing?.ratio ?? null),
  ),
  source: 'Each ring leaves at its own speed and that of the stream past the nozzle; a few radii are common practice.',
  mark: 'common practice',
  range: `Below ${CLOSE_RINGS} radii the rings move each other, and the train should be followed on the Wake page.`,
  inside: thruster.ringSpacing !== null && !thruster.ringSpacing.close,
  verdict:
    thruster.ringSpacing === null
      ? 'There is no ring that leaves.'
      : `${figure(thruster.ringSpacing.ratio)} radii from ring to ring.`,
})

const ringImpulse: ThrusterExplanationMaker = ({ thruster }) => {
  const [from, to] = MEASURED_BEST_STROKE
  const best = thruster.ringImpulsePerWork?.best ?? null
  const { strokeRatio } = thruster.pulse
  return {
    title: 'Share of the ring',
    mathml: formula(over(sub('I', 'ring'), 'I')),
    formula:
      'Impulse that has left by the formation number over that of the whole pulse: the rest trails behind the ring.',
    values: present(
      value('stroke ratio', strokeRatio),
      value('share, adopted', thruster.ringShare.adopted),
      value('share, lowest formation number', thruster.ringShare.low),
      value('share, highest', thruster.ringShare.high),
      value('stroke ratio of most ring impulse per work', best),
    ),
    source: `Slug cut at the formation number. Measured best stroke ratio ${from} to ${to}: Krieg, Coley, Hart & Mohseni 2005 (conference; recalled, not re-read).`,
    mark: 'recalled',
    range: 'The trailing jet pushes as well: neither thrust nor power depends on the formation number.',
    inside: strokeRatio <= to,
    verdict:
      best === null
        ? 'No formation number is adopted.'
        : `This stroke is ${figure(strokeRatio)} D; a unit of work buys most ring impulse at ${figure(best)} D.`,
  }
}

const turning: ThrusterExplanationMaker = ({ section, thruster }) => ({
  title: 'Turning moments',
  mathml: formula('M = a f I cos θ'),
  formula:
    'Arm times the mean jet thrust of one thruster: one of a pair off, one against the other, or both turned to one side.',
  values: present(
    value('arm a', section.arm, 'm'),
    value('one off', thruster.turning?.oneOff ?? null, 'N m'),
    value('opposed', thruster.turning?.opposed ?? null, 'N m'),
    value('both turned', thruster.turning?.vectored ?? null, 'N m'),
    value('side force', thruster.turning?.sideForce ?? null, 'N'),
  ),
  source: 'Moment about the vehicle’s centre at rest; the intake’s pull is taken to act through the centre.',
  mark: 'identity',
  range: 'Mean over the period, vehicle at rest.',
  inside: thruster.turning !== null,
  verdict: 'A moment that comes in pulses also yaws the vehicle in pulses.',
})

export const FURTHER_THRUSTER_EXPLANATIONS = {
  peakThrust,
  cavity,
  cavitationMargin,
  ringSpacing,
  ringImpulse,
  turning,
} as const
