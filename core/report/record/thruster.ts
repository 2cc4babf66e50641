/** Thrusters on their vehicle in print: thrust with its range, power, efficiencies by name, cavitation, cycle. */
import { CRUISE_REACHED, type ThrusterResult } from '../../thruster'
import type { DocumentBlock } from '../document/types'
import { powerBar, thrusterPlots } from '../thrusterPlots'
import { plotFigures } from './figures'
import { figureTable, type FigureRow } from './pulse'
import { duration, NONE, percent, plain, type Show } from './show'
import { sizingBlocks } from './sizing'
import type { RecordContext } from './types'

/** The figures with ranges, which stand first and in the summary too. */
export function thrustFigures(thruster: ThrusterResult, show: Show): readonly FigureRow[] {
  const [low, high] = thruster.meanThrustRange
  const share = thruster.ringShare
  return [
    [
      'Mean thrust',
      show.range(low, high, 'force'),
      show.result(thruster.meanThrust, 'force'),
      `slug${thruster.proximityLoss > 0 ? ' with the loss of close neighbours' : ''}, to slug${thruster.quickStart ? ' with quick start' : '; the start is too slow for over-pressure'}`,
    ],
    [
      'Share of the impulse in the ring',
      shareRange(share.low, share.high),
      percent(share.adopted),
      'between the formation numbers',
    ],
  ]
}

function shareRange(low: number | null, high: number | null): string {
  if (low === null || high === null) return NONE
  return low === high ? percent(low) : `${percent(Math.min(low, high))} to ${percent(Math.max(low, high))}`
}

export function thrusterBlocks(context: RecordContext): readonly DocumentBlock[] {
  const { plan, data, show } = context
  const section = plan.thruster
  if (data.thruster === null || section === null) return []
  const { result, sizing } = data.thruster
  const units = {
    time: show.unit('time', [result.period]),
    speed: show.unit('vehicleSpeed', [result.speed]),
    exitSpeed: show.unit('speed', [result.pulse.peakSpeed]),
    pressure: show.unit('pressure', [result.cavity.pressureHigh]),
    force: show.unit('force', [result.meanThrust]),
    power: show.unit('power', [result.power.total]),
  }
  const plots = thrusterPlots({
    section,
    nozzle: plan.nozzle,
    water: data.water,
    thruster: result,
    units,
  })
  return [
    { kind: 'subheading', text: section.count === 1 ? 'Thruster' : `Thrusters, ${section.count} together` },
    figureTable(null, thrustFigures(result, show)),
    { kind: 'pairs', rows: figures(result, show) },
    powerTable(result, show),
    ...dutyTable(result, show),
    { kind: 'pairs', rows: flowFigures(result, show) },
    ...plotFigures([...plots.cycle, ...plots.travel]),
    ...(sizing === null ? [] : sizingBlocks(context, sizing)),
  ]
}

function figures(thruster: ThrusterResult, show: Show): (readonly [string, string])[] {
  const { cruise, startUp } = thruster
  return [
    ['Thrust per pulse of one', show.result(thruster.thrustPerPulse, 'impulse')],
    ['Peak thrust', show.result(thruster.peakThrust, 'force')],
    ['Steady jet of equal flow', show.result(thruster.steadyJetThrust, 'force')],
    ['Over that steady jet', plain(thruster.thrustRatio)],
    ['Ripple over the mean', plain(thruster.ripple)],
    ['Duty cycle of the stroke', percent(thruster.duty)],
    ['Speed of the vehicle', show.result(thruster.speed, 'vehicleSpeed')],
    ['Drag at that speed', show.result(thruster.dragAtSpeed, 'force')],
    ['Excess of thrust over drag', show.result(excess(thruster), 'force')],
    ['Cruise speed reached from rest', show.result(cruise?.fromRest, 'vehicleSpeed')],
    [`Time to ${percent(CRUISE_REACHED)} of it`, show.result(startUp?.time, 'wakeTime')],
    ['Way until then', show.result(startUp?.distance, 'bodyLength')],
    ['Froude efficiency', percent(thruster.froudeEfficiency)],
    ['Overall efficiency', percent(thruster.overallEfficiency)],
    ['Cost of transport', plain(thruster.costOfTransport)],
    [
      'Energy per distance',
      thruster.energyPerDistance === null ? NONE : `${plain(thruster.energyPerDistance)}\u00A0J/m`,
    ],
    ['Endurance', duration(thruster.endurance)],
    ['Range', show.result(thruster.range, 'bodyLength')],
    ...turning(thruster, show),
  ]
}

/** A balance that is met leaves a residue of rounding: below this share of the drag it is none. */
const RESIDUE = 1e-9

function excess({ excessThrust, dragAtSpeed }: ThrusterResult): number | null {
  if (excessThrust === null || dragAtSpeed === null) return excessThrust
  return Math.abs(excessThrust) < RESIDUE * Math.abs(dragAtSpeed) ? 0 : excessThrust
}

/** Of the plunger in stroke and refill the faster counts; the pulse tells the stroke's own. */
function whileRefilling({ plunger, pulse }: ThrusterResult): string {
  return plunger.speed > pulse.pistonPeakSpeed * (1 + RESIDUE) ? ', while refilling' : ''
}

function turning({ turning: moments }: ThrusterResult, show: Show): (readonly [string, string])[] {
  if (moments === null) return []
  const moment = (value: number): string => `${plain(value)}\u00A0N·m`
  return [
    ['Turning moment, one alone', moment(moments.oneOff)],
    ['Turning moment, one ahead and one astern', moment(moments.opposed)],
    ['Turning moment, both turned by the cant', moment(moments.vectored)],
    ['Side force of both', show.result(moments.sideForce, 'force')],
  ]
}

/** Where the power goes; efficiencies are named, never mixed. */
function powerTable(thruster: ThrusterResult, show: Show): DocumentBlock {
  const parts = powerBar(thruster)
  const values = [...parts.map(({ power }) => power), thruster.power.total]
  const column = show.column('Power', 'power', values)
  const names = [...parts.map(({ label }) => label), 'total, put into the actuators']
  return {
    kind: 'table',
    caption: 'Mean power of all thrusters and where it goes',
    columns: [{ title: 'Part' }, column.column, { title: 'Share', numeric: true }],
    rows: names.map((name, i) => [name, column.cells[i] ?? NONE, percent(parts[i]?.share ?? 1)]),
  }
}

function dutyTable({ duties }: ThrusterResult, show: Show): DocumentBlock[] {
  if (duties.length === 0) return []
  return [
    {
      kind: 'table',
      caption: 'Duty points with the plan as it stands',
      columns: [
        { title: 'Duty point' },
        { title: 'Speed', numeric: true },
        { title: 'Thrust needed', numeric: true },
        { title: 'Thrust given', numeric: true },
        { title: 'Short by', numeric: true },
        { title: 'State' },
      ],
      rows: duties.map(({ speed, thrust, needed, shortfall }, i) => [
        String(i + 1),
        speed === null ? 'standing' : show.result(speed, 'vehicleSpeed'),
        show.result(needed, 'force'),
        show.result(thrust, 'force'),
        shortfall === 0 ? NONE : show.result(shortfall, 'force'),
        shortfall === 0 ? 'met' : 'NOT MET',
      ]),
    },
  ]
}

function flowFigures(thruster: ThrusterResult, show: Show): (readonly [string, string])[] {
  const { cavitation, cavity, plunger, ringSpacing } = thruster
  return [
    ['Frequency', show.result(thruster.frequency, 'frequency')],
    ['Mean flow of all', show.result(thruster.flow, 'flowRate')],
    ['Plunger travel', show.result(plunger.travel, 'length')],
    [`Peak plunger speed${whileRefilling(thruster)}`, show.result(plunger.speed, 'speed')],
    ['Plunger acceleration', show.result(plunger.acceleration, 'acceleration')],
    ['Plunger force', show.result(plunger.force, 'force')],
    ['Peak power of one', show.result(plunger.peakPower, 'power')],
    ['Left to refill', show.result(thruster.refillTime, 'time')],
    ['Peak speed in the intake', show.result(thruster.intakeSpeed, 'speed')],
    ['Volume of the cavity', show.result(cavity.volume, 'volume')],
    ['Length of cavity and nozzle', show.result(cavity.length, 'length')],
    ['Cavity pressure, highest over outside', show.result(cavity.pressureHigh, 'pressure')],
    ['Cavity pressure, lowest over outside', show.result(cavity.pressureLow, 'pressure')],
    ['Pressure outside', show.result(cavitation.ambientPressure, 'pressure')],
    ['Vapour pressure', show.result(cavitation.vapourPressure, 'pressure')],
    ['Pressure in the ring core', show.result(cavitation.corePressure, 'pressure')],
    ['Pressure behind the intake', show.result(cavitation.intakePressure, 'pressure')],
    ['Least margin over vapour pressure', show.result(cavitation.margin, 'pressure')],
    ['Cavitation number, exit', plain(cavitation.exitNumber)],
    ['Cavitation number, intake', plain(cavitation.intakeNumber)],
    ['Loss to close neighbours', percent(thruster.proximityLoss)],
    [
      'Ring spacing over ring radius',
      ringSpacing === null ? NONE : `${plain(ringSpacing.ratio)}${ringSpacing.close ? ', close' : ''}`,
    ],
    ['Best stroke ratio for ring per work', plain(thruster.ringImpulsePerWork?.best)],
  ]
}
