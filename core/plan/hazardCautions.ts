/**
 * Hazards of a machine that moves, of a laboratory run and of a vehicle on its bench. Common practice of the trade; every one
 * leaves the decision to local rules and qualified people.
 */
import type { CautionContext, CautionDefinition, CautionGroup } from './cautionTypes'

const LOCAL = 'Follow local rules and let a qualified person decide.'

/** A tank run is planned: hazards of laser, mains, water, glass and the moving piston. */
const inLaboratory = ({ plan }: CautionContext): boolean => plan.tankRun !== null
/** A vehicle is sized: hazards of intake, batteries, launch and bench. */
const onVehicle = ({ plan }: CautionContext): boolean => plan.thruster !== null

type Row = readonly [id: string, text: string]

function group(
  name: CautionGroup,
  holds: (context: CautionContext) => boolean,
  rows: readonly Row[],
): CautionDefinition[] {
  return rows.map(([id, text]) => ({
    id,
    group: name,
    source: 'common practice',
    text: (context) => (holds(context) ? `${text} ${LOCAL}` : null),
  }))
}

const MACHINE: readonly Row[] = [
  [
    'machine-first-run',
    'Make the first run slow and unloaded: a wrong scale or sign moves the piston further or faster than meant.',
  ],
  ['machine-guard', 'Keep a guard around the piston and an emergency stop within reach.'],
  ['machine-switches', 'Check homing and end switches before a profile is run.'],
  [
    'machine-sign-unit',
    'Confirm sign and unit of the profile on the controller: position, speed and time scale are easily mistaken.',
  ],
  [
    'machine-relief',
    'Provide relief for a blocked nozzle: a driven piston against a closed exit builds up pressure at once.',
  ],
  ['machine-hands', 'Keep hands clear of the plunger and its rod: they crush.'],
]

const LABORATORY: readonly Row[] = [
  [
    'laser',
    'Laser light sheet: know the class, interlock the area, wear eyewear rated for its wavelength and density, and stop stray reflections from surface, bubbles and glass.',
  ],
  ['strobe', 'Strobing light can trigger seizures: warn whoever enters.'],
  ['mains-water', 'Mains near water: use residual-current protection and keep supplies above and away from splash.'],
  ['moving-piston', 'The piston moves without warning when armed: keep hands out and announce each run.'],
  ['compressed-air', 'Pressurised vessels and compressed-air lines: release the pressure before opening them.'],
  ['seeding-powder', 'Dry seeding powder is not to be inhaled: weigh and wet it under extraction or with a mask.'],
  ['dye', 'Dyes: read the data sheet, wear gloves, and dispose of the water as it says.'],
  ['standing-water', 'Standing water grows germs: change or treat it.'],
  ['slips', 'Water on the floor makes people slip: mop up between runs.'],
  ['glass-load', 'A filled glass tank is heavy and breaks suddenly: check floor load, stand and edges.'],
  ['lifting', 'Lift tank parts and water with help or gear: a litre weighs a kilogram.'],
  ['working-alone', 'Do not work alone with lasers, lifting or mains near water.'],
]

const VEHICLE: readonly Row[] = [
  ['intake', 'Intakes suck and entangle: fit a guard and keep divers, swimmers and loose lines away.'],
  ['plunger-crush', 'A plunger under power crushes fingers: lock it before reaching in.'],
  [
    'battery',
    'Lithium batteries in sealed housings can vent and burst: provide relief and charge outside the housing.',
  ],
  [
    'housing-pressure',
    'Housings can flood, implode at depth, or hold trapped pressure on recovery: open them only after venting.',
  ],
  ['launch', 'Launch and lifting: rate the gear and keep people from under the load.'],
  ['tether', 'Keep the vehicle on a tether for its first runs.'],
  ['bench', 'A thruster on a bench reacts and splashes: clamp it and keep electrics dry.'],
  ['wildlife', 'Wildlife and permits: ask before running in open water.'],
  [
    'flow-loading-only',
    'Pressures given here are flow loading only, not a pressure-vessel, housing, seal or fatigue calculation.',
  ],
]

export const HAZARD_CAUTIONS: readonly CautionDefinition[] = [
  ...group('machine', inLaboratory, MACHINE),
  ...group('laboratory', inLaboratory, LABORATORY),
  ...group('vehicle', onVehicle, VEHICLE),
]
