/**
 * The table of units: symbol as shown, exact factor to the base unit as a fraction, other spellings.
 *
 * Every factor is exact by definition. Sources: the SI Brochure, 9th ed. 2019 (SI prefixes, min, h, L, t, degree);
 * international yard and pound agreement 1959 (1 in = 25.4 mm, 1 lb = 0.45359237 kg), with standard gravity for lbf;
 * 1 kn = 1852 m/h; 1 atm = 101325 Pa; 1 mmHg = 133.322387415 Pa (ISO 80000-4 conventional value);
 * practical salinity x 35.16504/35 g/kg (Millero et al. 2008, reference-composition salinity).
 */
import type { Dimension } from './dimensions'

/** Symbol, numerator and denominator of the factor to the base unit, further spellings that are accepted. */
export type UnitRow = readonly [symbol: string, numerator: number, denominator: number, ...spellings: string[]]

/** First row of each dimension: the unit shown unless the user chooses another. Each dimension holds its base unit. */
export const UNIT_TABLE: Readonly<Record<Dimension, readonly UnitRow[]>> = {
  length: [
    ['mm', 1, 1e3],
    ['cm', 1, 1e2],
    ['m', 1, 1],
    ['µm', 1, 1e6],
    ['km', 1e3, 1],
    ['in', 254, 1e4],
    ['ft', 3048, 1e4],
  ],
  area: [
    ['cm²', 1, 1e4],
    ['mm²', 1, 1e6],
    ['m²', 1, 1],
    ['in²', 64516, 1e8],
    ['ft²', 9290304, 1e8],
  ],
  volume: [
    ['mL', 1, 1e6],
    ['L', 1, 1e3],
    ['µL', 1, 1e9],
    ['cm³', 1, 1e6, 'cc'],
    ['mm³', 1, 1e9],
    ['m³', 1, 1],
  ],
  time: [
    ['s', 1, 1],
    ['ms', 1, 1e3],
    ['µs', 1, 1e6],
    ['min', 60, 1],
    ['h', 3600, 1],
  ],
  speed: [
    ['m/s', 1, 1],
    ['cm/s', 1, 1e2],
    ['mm/s', 1, 1e3],
    ['km/h', 1e3, 3600, 'kph', 'kmh'],
    ['kn', 1852, 3600],
    ['ft/s', 3048, 1e4],
    ['in/s', 254, 1e4],
  ],
  acceleration: [
    ['m/s²', 1, 1],
    ['cm/s²', 1, 1e2],
    ['mm/s²', 1, 1e3],
    ['ft/s²', 3048, 1e4],
  ],
  jerk: [
    ['m/s³', 1, 1],
    ['cm/s³', 1, 1e2],
    ['mm/s³', 1, 1e3],
    ['ft/s³', 3048, 1e4],
  ],
  temperature: [
    ['°C', 1, 1, 'degC', 'C'],
    ['K', 1, 1],
    ['°F', 5, 9, 'degF', 'F'],
  ],
  pressure: [
    ['kPa', 1e3, 1],
    ['Pa', 1, 1],
    ['hPa', 1e2, 1],
    ['MPa', 1e6, 1],
    ['mbar', 1e2, 1],
    ['bar', 1e5, 1],
    ['atm', 101325, 1],
    ['mmHg', 133322387415, 1e9],
    ['psi', 44482216152605, 6451600000, 'PSI'],
  ],
  force: [
    ['mN', 1, 1e3],
    ['N', 1, 1],
    ['µN', 1, 1e6],
    ['kN', 1e3, 1],
    ['MN', 1e6, 1],
    ['lbf', 44482216152605, 1e13],
  ],
  power: [
    ['W', 1, 1],
    ['mW', 1, 1e3],
    ['µW', 1, 1e6],
    ['kW', 1e3, 1],
    ['MW', 1e6, 1],
  ],
  energy: [
    ['mJ', 1, 1e3],
    ['J', 1, 1],
    ['µJ', 1, 1e6],
    ['kJ', 1e3, 1],
    ['MJ', 1e6, 1],
    ['Wh', 3600, 1, 'W·h'],
    ['kWh', 3600000, 1, 'kW·h'],
  ],
  mass: [
    ['kg', 1, 1],
    ['g', 1, 1e3],
    ['mg', 1, 1e6],
    ['t', 1e3, 1, 'tonne'],
    ['lb', 45359237, 1e8],
  ],
  density: [
    ['kg/m³', 1, 1],
    ['g/cm³', 1e3, 1],
    ['g/mL', 1e3, 1],
    ['kg/L', 1e3, 1],
    ['g/L', 1, 1],
  ],
  kinematicViscosity: [
    ['mm²/s', 1, 1e6],
    ['m²/s', 1, 1],
    ['cSt', 1, 1e6],
    ['cm²/s', 1, 1e4],
    ['St', 1, 1e4],
  ],
  circulation: [
    ['cm²/s', 1, 1e4],
    ['m²/s', 1, 1],
    ['mm²/s', 1, 1e6],
  ],
  frequency: [
    ['Hz', 1, 1, '1/s'],
    ['mHz', 1, 1e3],
    ['kHz', 1e3, 1],
    ['MHz', 1e6, 1],
    ['rpm', 1, 60, '1/min', 'RPM', 'rev/min', 'r/min'],
  ],
  imageScale: [
    ['px/mm', 1e3, 1, '1/mm'],
    ['px/m', 1, 1, '1/m'],
    ['px/cm', 1e2, 1, '1/cm'],
  ],
  flowRate: [
    ['mL/s', 1, 1e6],
    ['L/s', 1, 1e3],
    ['µL/s', 1, 1e9],
    ['mL/min', 1, 6e7],
    ['L/min', 1, 6e4],
    ['cm³/s', 1, 1e6, 'cc/s'],
    ['m³/s', 1, 1],
    ['m³/h', 1, 3600],
  ],
  impulse: [
    ['mN·s', 1, 1e3, 'mNs'],
    ['N·s', 1, 1, 'Ns'],
    ['µN·s', 1, 1e6, 'µNs'],
    ['kg·m/s', 1, 1],
    ['lbf·s', 44482216152605, 1e13],
  ],
  angle: [
    ['°', Math.PI, 180, 'deg'],
    ['rad', 1, 1],
    ['mrad', 1, 1e3],
  ],
  salinity: [
    ['', 1, 1, 'PSU', 'psu'],
    ['g/kg', 3500000, 3516504, '‰'],
  ],
  number: [
    ['', 1, 1],
    ['%', 1, 100],
  ],
}

/** The unit each dimension is stored in. */
export const BASE_UNIT: Readonly<Record<Dimension, string>> = {
  length: 'm',
  area: 'm²',
  volume: 'm³',
  time: 's',
  speed: 'm/s',
  acceleration: 'm/s²',
  jerk: 'm/s³',
  temperature: '°C',
  pressure: 'Pa',
  force: 'N',
  power: 'W',
  energy: 'J',
  mass: 'kg',
  density: 'kg/m³',
  kinematicViscosity: 'm²/s',
  circulation: 'm²/s',
  frequency: 'Hz',
  imageScale: 'px/m',
  flowRate: 'm³/s',
  impulse: 'N·s',
  angle: 'rad',
  salinity: '',
  number: '',
}

/** Added to the typed number before the factor, for scales whose zero is not that of the base unit. */
export const OFFSETS: ReadonlyMap<string, number> = new Map([
  ['K', -273.15],
  ['°F', -32],
])
