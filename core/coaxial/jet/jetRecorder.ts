/**
 * What a run of the starting jet keeps: its history, shapes of the sheet, and the look for pinch-off. Scaled inside, SI out.
 */
import { at } from '../../base'
import type { Kernel } from '../../kernel'
import type { JetFlow } from './jetFlow'
import { firstPlateau, type Plateau, type PlateauRow } from './plateau'
import { axialDensity, ringCut } from './ringCut'
import type { ScaledProgramme } from './scaledProgramme'
import type { Sheet } from './sheet'
import { sheetSums, type PartSums, type SheetSums } from './sheetSums'
import type { JetHistory, JetSnapshot } from './types'

/** What scaled values are multiplied by. */
export interface JetScales {
  readonly density: number
  readonly length: number
  readonly speed: number
  readonly time: number
  readonly circulation: number
  readonly impulse: number
  readonly energy: number
}

export function jetScales(density: number, diameter: number, peakSpeed: number): JetScales {
  return {
    density,
    length: diameter,
    speed: peakSpeed,
    time: diameter / peakSpeed,
    circulation: peakSpeed * diameter,
    impulse: density * peakSpeed * diameter ** 3,
    energy: density * peakSpeed ** 2 * diameter ** 3,
  }
}

/** One look at the jet, scaled. */
export interface JetRow {
  readonly time: number
  readonly formationTime: number
  readonly total: PartSums
  /** null until a ring is cut. */
  readonly ring: PartSums | null
  readonly trailingJet: boolean
  readonly cutX: number | null
  readonly ratio: number | null
}

export class JetRecorder {
  readonly rows: JetRow[] = []
  readonly snapshots: JetSnapshot[] = []
  plateau: Plateau | null = null

  constructor(
    private readonly sheet: Sheet,
    private readonly flow: JetFlow,
    private readonly kernel: Kernel,
    private readonly programme: ScaledProgramme,
    private readonly scales: JetScales,
  ) {}

  /** Writes a row, and looks for the plateau until one is found. */
  look(time: number): JetRow {
    const { sheet, programme, rows } = this
    const cut = ringCut(axialDensity(sheet.x, sheet.circulation, sheet.count))
    const trailingJet = cut?.trailingJet ?? false
    // Until the stroke is over a sheet without a valley is a ring that still fills.
    const known = cut !== null && (trailingJet || time >= programme.duration)
    const sums = this.sums(time, known ? cut.x : -Infinity)
    const row: JetRow = {
      time,
      formationTime: programme.formationTime(time),
      total: sums.total,
      ring: known ? sums.ring : null,
      trailingJet,
      cutX: trailingJet && cut !== null ? cut.x : null,
      ratio: cut?.ratio ?? null,
    }
    rows.push(row)
    this.plateau ??= firstPlateau(rows.map(plateauRow))
    return row
  }

  sums(time: number, cutX: number): SheetSums {
    return sheetSums(this.sheet, (i) => this.flow.deltaSquaredOf(this.sheet, i, time), this.kernel, cutX)
  }

  /** Keeps the shape of the sheet, with the cut of the last row. */
  keepShape(time: number): void {
    const { sheet, scales, programme } = this
    const { count } = sheet
    const scaled = (list: Float64Array, by: number): Float64Array => list.slice(0, count).map((value) => value * by)
    const cutX = this.rows[this.rows.length - 1]?.cutX ?? null
    this.snapshots.push({
      time: time * scales.time,
      formationTime: programme.formationTime(time),
      looseCount: sheet.looseCount,
      x: scaled(sheet.x, scales.length),
      r: scaled(sheet.r, scales.length),
      circulation: scaled(sheet.circulation, scales.circulation),
      age: sheet.birth.slice(0, count).map((birth) => (time - birth) * scales.time),
      cutX: cutX === null ? null : cutX * scales.length,
    })
  }

  history(): JetHistory {
    const { rows, scales } = this
    const ring = (value: (part: PartSums) => number, by: number): (number | null)[] =>
      rows.map((row) => (row.ring === null ? null : value(row.ring) * by))
    return {
      time: rows.map((row) => row.time * scales.time),
      formationTime: rows.map((row) => row.formationTime),
      totalCirculation: rows.map((row) => row.total.circulation * scales.circulation),
      totalImpulse: rows.map((row) => row.total.impulse * scales.impulse),
      totalEnergy: rows.map((row) => row.total.energy * scales.energy),
      ringCirculation: ring((part) => part.circulation, scales.circulation),
      ringX: ring((part) => part.x, scales.length),
      ringRadius: ring(partRadius, scales.length),
      ringImpulse: ring((part) => part.impulse, scales.impulse),
      ringEnergy: ring((part) => part.energy, scales.energy),
      cutX: rows.map((row) => (row.cutX === null ? null : row.cutX * scales.length)),
    }
  }

  /** Time and formation time at which the total circulation first reached a value, between rows by a straight line. */
  reached(circulation: number): { readonly time: number; readonly formationTime: number } | null {
    const { rows, programme } = this
    for (let i = 0; i < rows.length; i++) {
      const row = at(rows, i)
      if (row.total.circulation < circulation) continue
      const before = i > 0 ? at(rows, i - 1) : null
      if (before === null) return row
      const share = (circulation - before.total.circulation) / (row.total.circulation - before.total.circulation)
      const time = before.time + share * (row.time - before.time)
      return { time, formationTime: programme.formationTime(time) }
    }
    return null
  }
}

/** Radius of one ring of the part's circulation and impulse. */
export function partRadius(part: PartSums): number {
  return Math.sqrt(part.impulse / (Math.PI * part.circulation))
}

function plateauRow(row: JetRow): PlateauRow {
  return { time: row.time, circulation: row.trailingJet ? (row.ring?.circulation ?? null) : null, ratio: row.ratio }
}
