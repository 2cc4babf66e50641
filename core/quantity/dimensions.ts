/**
 * The dimensions a field can have, and how each is named in a sentence.
 */

const WORDS = {
  length: { noun: 'a length', example: '12 mm' },
  area: { noun: 'an area', example: '3 cm²' },
  volume: { noun: 'a volume', example: '12 mL' },
  time: { noun: 'a time', example: '0.5 s' },
  speed: { noun: 'a speed', example: '0.2 m/s' },
  acceleration: { noun: 'an acceleration', example: '2 m/s²' },
  jerk: { noun: 'a jerk', example: '20 m/s³' },
  temperature: { noun: 'a temperature', example: '15 °C' },
  pressure: { noun: 'a pressure', example: '101.3 kPa' },
  force: { noun: 'a force', example: '30 mN' },
  power: { noun: 'a power', example: '2 W' },
  energy: { noun: 'an energy', example: '5 mJ' },
  mass: { noun: 'a mass', example: '2 kg' },
  density: { noun: 'a density', example: '998 kg/m³' },
  kinematicViscosity: { noun: 'a kinematic viscosity', example: '1.1 mm²/s' },
  circulation: { noun: 'a circulation', example: '120 cm²/s' },
  frequency: { noun: 'a frequency', example: '2 Hz' },
  imageScale: { noun: 'an image scale', example: '12 px/mm' },
  flowRate: { noun: 'a flow rate', example: '2.5 mL/s' },
  impulse: { noun: 'an impulse', example: '3 mN·s' },
  angle: { noun: 'an angle', example: '30°' },
  salinity: { noun: 'a salinity', example: '35' },
  number: { noun: 'a plain number', example: '4' },
} as const

/** What a number measures. Stored in the SI base unit, temperature in degrees Celsius, salinity on the practical scale. */
export type Dimension = keyof typeof WORDS

/** The dimension with its article and an example: 'a length such as 12 mm'. */
export function describeDimension(dimension: Dimension): string {
  return `${WORDS[dimension].noun} such as ${WORDS[dimension].example}`
}

/** The dimension with its article: 'a length'. */
export function dimensionNoun(dimension: Dimension): string {
  return WORDS[dimension].noun
}
