/**
 * Computes the table of the steady family and writes it as a TypeScript module. Run by generate-steady-family.mjs.
 */
import { at } from '../core/base'
import { chebyshevSlope, chebyshevSum } from '../core/ring/chebyshev'
import { cosineSeries } from '../core/ring/coreContour'
import { bodyShape, type CarriedBody } from '../core/ring/dividingStreamline'
import { secondOrderRatios } from '../core/ring/secondOrderRing'
import { coreRatioAt, familyCoordinate, solveSteadyFamily } from '../core/ring/steadyContinuation'
import { solvedCarriedBody } from '../core/ring/steadyIntegrals'
import { lineBody, lineCarriedVolume, sphereLimit, steadyRow, type SteadyRow } from '../core/ring/steadyRow'
import { byParticleTime, type SolvedRing } from '../core/ring/steadySolver'

/** Degree in the coordinate w: the last coefficients are about 1e-11. */
const DEGREE = 80
const FIRST_CORE_RATIO = 0.01
const LAST_CORE_RATIO = Math.SQRT2 - 1e-3
/** Outlines are for drawing: what is smaller than this, in units of the mean radius, is left out. */
const OUTLINE_DIGITS = 6
const CARRIED_SHAPE_TERMS = 16
const LINE_DEGREE = 40
/** Speeds 4 pi R U / Gamma of a vortex line that the volume series reach: eps = 1e-300, and below Hill's 1.59. */
const LINE_FASTEST = 720
const LINE_SLOWEST = 1.5

interface Row extends SteadyRow {
  readonly coreRatio: number
  readonly axial: readonly number[]
  readonly radial: readonly number[]
  readonly equator: number
  readonly shape: readonly number[]
}

export interface TableModules {
  /** Text of steadyFamilyTable.ts: what numbers are computed from. */
  readonly family: string
  /** Text of steadyOutlineTable.ts: what is drawn. */
  readonly outline: string
}

/** Both modules as text. @param report is told each row as it is done */
export function steadyFamilyModules(report: (done: number, of: number, coreRatio: number) => void): TableModules {
  const w0 = familyCoordinate(FIRST_CORE_RATIO)
  const w1 = familyCoordinate(LAST_CORE_RATIO)
  // Nodes run from s = -1 (thin) to s = 1; series are taken from s = 1 down.
  const coreRatios = Array.from({ length: DEGREE + 1 }, (_, i) =>
    coreRatioAt((w0 + w1) / 2 - ((w1 - w0) / 2) * Math.cos((Math.PI * i) / DEGREE)),
  )
  const rows: Row[] = []
  solveSteadyFamily(coreRatios, (ring) => {
    rows.unshift(tableRow(ring))
    report(rows.length, coreRatios.length, ring.coreRatio)
  })
  const series = (pick: (row: Row) => number): Float64Array => cosineSeries(rows.map(pick))
  const speed = series((row) => row.speed)
  const impulse = series((row) => row.impulse)
  const energy = series((row) => row.energy)
  const inner = series((row) => row.inner)
  const carried = series((row) => row.carried)
  const full = (values: ArrayLike<number>): string => numbers(values, (value) => String(Number(value.toPrecision(15))))

  const end = { w: w1, half: (w1 - w0) / 2 }
  const thin = secondOrderRatios
  const slope = (of: (eps: number) => number): number =>
    (of(coreRatioAt(w1 + 1e-4)) - of(coreRatioAt(w1 - 1e-4))) / 2e-4
  const nearHill = {
    speed: logTerms(end, speed, (eps) => sphereLimit(eps).speed - thin(eps).speed, 2, slope),
    impulse: logTerms(end, impulse, (eps) => sphereLimit(eps).impulse - thin(eps).impulse, 2, slope),
    energy: logTerms(end, energy, (eps) => sphereLimit(eps).energy - thin(eps).energy, 2, slope),
    inner: logTerms(end, inner, () => 1, 1, slope),
    carried: logTerms(end, carried, (eps) => sphereLimit(eps).carried, 2, slope),
  }
  const family = [
    ...header('Steady vortex rings with vorticity proportional to the distance from the axis, as Chebyshev series.'),
    '/** Ends of w = ln(eps / (sqrt 2 - eps)) that the series cover. */',
    `export const FIRST_COORDINATE = ${w0}`,
    `export const LAST_COORDINATE = ${w1}`,
    '',
    ...named('SPEED', '4 pi L U / Gamma less its second-order value.', full(speed)),
    ...named('IMPULSE', 'I / (rho pi Gamma L^2) less its second-order value.', full(impulse)),
    ...named('ENERGY', '2 E / (rho Gamma^2 L) less its second-order value.', full(energy)),
    ...named('INNER', 'Inner radius over (1 - eps / sqrt 2) L.', full(inner)),
    ...named(
      'CARRIED',
      'Volume carried over that of a vortex line of equal impulse, circulation and speed.',
      full(carried),
    ),
    '/**',
    ' * [b, c] of d^n (b ln d + c), d = sqrt 2 - eps, which is added to the sphere of radius 2 - d / sqrt 2 beyond the last coordinate;',
    ' * n = 1 for inner, else 2.',
    ' */',
    'export const NEAR_HILL = {',
    ...Object.entries(nearHill).map(([name, terms]) => `  ${name}: [${terms[0]}, ${terms[1]}],`),
    '} as const',
    '',
    '/** Vortex line: ln of volume times speed squared in sqrt |ln(speed / 2 pi)|, 0 to the limit; speed = 4 pi R U / Gamma. */',
    `export const LINE_FAST_LIMIT = ${Math.sqrt(Math.log(LINE_FASTEST / (2 * Math.PI)))}`,
    `export const LINE_SLOW_LIMIT = ${Math.sqrt(Math.log((2 * Math.PI) / LINE_SLOWEST))}`,
    ...named('LINE_FAST', 'Above speed 2 pi: a torus is carried.', full(lineSeries(LINE_FASTEST))),
    ...named('LINE_SLOW', 'Below speed 2 pi: a body that reaches the axis is carried.', full(lineSeries(LINE_SLOWEST))),
  ].join('\n')
  const list = (pick: (row: Row) => readonly number[], from: number): string[] => {
    const length = Math.max(...rows.map((row) => pick(row).length))
    const lines = Array.from({ length: length - from }, (_, k) => outline(series((row) => pick(row)[k + from] ?? 0)))
    while (lines[lines.length - 1] === '0') lines.pop()
    return lines.map((line) => `  [${line}],`)
  }
  const outlines = [
    ...header('Outlines of steady vortex rings for drawing, as Chebyshev series in w.'),
    '/** Core boundary x / eps = sum X_k(w) sin kt; one series a harmonic, k from 1. */',
    'export const OUTLINE_AXIAL: readonly (readonly number[])[] = [',
    ...list((row) => row.axial, 1),
    ']',
    '',
    '/** Core boundary (r - 1) / eps = sum R_k(w) cos kt; one series a harmonic, k from 0. */',
    'export const OUTLINE_RADIAL: readonly (readonly number[])[] = [',
    ...list((row) => row.radial, 0),
    ']',
    '',
    '/** Carried body against that of the vortex line: outer radius. */',
    `export const BODY_EQUATOR: readonly number[] = [${outline(series((row) => row.equator))}]`,
    '',
    '/** Carried body against that of the vortex line: x / u, sum over T_k(2 u^2 - 1). */',
    'export const BODY_SHAPE: readonly (readonly number[])[] = [',
    ...list((row) => row.shape, 0),
    ']',
    '',
  ].join('\n')
  return { family, outline: outlines }
}

function header(what: string): string[] {
  return [
    '/**',
    ` * ${what}`,
    ' *',
    ' * Generated by build/generate-steady-family.mjs from the free-boundary solver in steadySolver.ts (the family of Norbury 1973,',
    ' * J. Fluid Mech. 57:417). Do not edit. How each series is read: steadyFamily.ts and steadyOutline.ts.',
    ' */',
    '',
  ]
}

function tableRow(ring: SolvedRing): Row {
  const body = solvedCarriedBody(ring)
  if (body === null) throw new Error(`no dividing streamline at core ratio ${ring.coreRatio}`)
  const row = steadyRow(ring)
  const thin = secondOrderRatios(ring.coreRatio)
  const lineRadius = Math.sqrt(row.impulse + thin.impulse)
  const line = lineBody((row.speed + thin.speed) * lineRadius)
  const eps = ring.coreRatio
  // The solved ring's parameter is its time only nearly; of the time itself the coefficients are smooth functions of w.
  const { contour } = byParticleTime(ring, ring.contour.radial.length - 1)
  return {
    ...row,
    coreRatio: eps,
    axial: [...contour.axial].map((value) => value / eps),
    radial: [...contour.radial].map((value, k) => (value - (k === 0 ? 1 : 0)) / eps),
    equator: body.equator / (line.equator * lineRadius),
    shape: shapeRatio(body, line, lineRadius),
  }
}

/** Chebyshev coefficients in 2 u^2 - 1 of the ratio of two bodies' x / u. */
function shapeRatio(body: CarriedBody, line: CarriedBody, lineRadius: number): number[] {
  const n = CARRIED_SHAPE_TERMS
  const angles = Array.from({ length: n }, (_, i) => (Math.PI * (i + 0.5)) / n)
  const ratios = angles.map((angle) => {
    const u = Math.sqrt((1 + Math.cos(angle)) / 2)
    return bodyShape(body, u, 0) / (lineRadius * bodyShape(line, u, 0))
  })
  return Array.from({ length: n }, (_, k) => {
    const sum = ratios.reduce((total, ratio, i) => total + ratio * Math.cos(k * at(angles, i)), 0)
    return ((k === 0 ? 1 : 2) * sum) / n
  })
}

/** [b, c] that continue a series beyond its end with equal value and slope. */
function logTerms(
  end: { readonly w: number; readonly half: number },
  series: Float64Array,
  limit: (eps: number) => number,
  power: number,
  slopeInW: (of: (eps: number) => number) => number,
): readonly [number, number] {
  const eps = coreRatioAt(end.w)
  const delta = Math.SQRT2 - eps
  const deltaSlope = (-delta * eps) / Math.SQRT2
  const excess = (chebyshevSum(series, 1) - limit(eps)) / delta ** power
  const rate = (chebyshevSlope(series, 1) / end.half - slopeInW(limit)) / delta ** power
  // d/dw of delta^n (b ln delta + c) over delta^n: (n excess + b) delta'/delta
  const b = (rate * delta) / deltaSlope - power * excess
  return [Number(b.toPrecision(10)), Number((excess - b * Math.log(delta)).toPrecision(10))]
}

function lineSeries(limit: number): Float64Array {
  const range = Math.log(limit / (2 * Math.PI))
  const widest = Math.sqrt(Math.abs(range))
  const values = Array.from({ length: LINE_DEGREE + 1 }, (_, j) => {
    const root = (widest * (1 + Math.cos((Math.PI * j) / LINE_DEGREE))) / 2
    const speed = 2 * Math.PI * Math.exp(Math.sign(range) * root * root)
    return Math.log(lineCarriedVolume(speed) * speed * speed)
  })
  return cosineSeries(values)
}

function outline(series: Float64Array): string {
  const rounded = [...series].map((value) => Number(value.toFixed(OUTLINE_DIGITS)))
  while (rounded.length > 1 && at(rounded, rounded.length - 1) === 0) rounded.pop()
  return rounded.join(', ')
}

function numbers(values: ArrayLike<number>, write: (value: number) => string): string {
  return Array.from(values, (value) => `  ${write(value)},`).join('\n')
}

function named(name: string, meaning: string, body: string): string[] {
  return [`/** ${meaning} */`, `export const ${name}: readonly number[] = [`, body, ']', '']
}
