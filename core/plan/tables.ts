/**
 * Results written out as the contract's tables and summary. The window's exports and the headless runner both call these.
 */
import { at } from '../base'
import type { PulseResult } from '../pulse'
import type { WaterProperties } from '../water'
import { writeCsv } from './csvWriter'
import type { Caution } from './types'

export const PULSE_COLUMNS = [
  'time (s)',
  'exit speed (m/s)',
  'formation time',
  'circulation (m2/s)',
  'impulse (N s)',
  'energy (J)',
] as const

/** pulse.csv: slug sums at 201 equal times plus the programme's corners. */
export function pulseTable(pulse: PulseResult): string {
  const { time, exitSpeed, formationTime, circulation, impulse, energy } = pulse.history
  const rows = time.map((t, i) => [
    t,
    at(exitSpeed, i),
    at(formationTime, i),
    at(circulation, i),
    at(impulse, i),
    at(energy, i),
  ])
  return writeCsv(PULSE_COLUMNS, rows)
}

export const SUMMARY_FORMAT = 'ringwright-summary'
export const SUMMARY_VERSION = 1

export interface SummaryInput {
  readonly water: WaterProperties
  readonly pulse: PulseResult | null
  readonly cautions: readonly Caution[]
  readonly title: string
  readonly files: readonly string[]
  readonly program: { readonly name: string; readonly version: string }
  readonly inputHash: string
}

/** summary.json: two-space indent, SI, null where an estimate is absent; sections not computed are left out. */
export function summaryText(input: SummaryInput): string {
  const { water, pulse } = input
  const document = {
    format: SUMMARY_FORMAT,
    version: SUMMARY_VERSION,
    title: input.title,
    program: input.program,
    inputHash: input.inputHash,
    files: input.files,
    water: {
      density: water.density,
      kinematicViscosity: water.kinematicViscosity,
      vapourPressure: water.vapourPressure ?? undefined,
      absolutePressure: water.absolutePressure,
      sources: water.sources,
      notes: water.notes,
    },
    pulse: pulse === null ? undefined : pulseSummary(pulse),
    cautions: input.cautions,
  }
  return `${JSON.stringify(document, null, 2)}\n`
}

/** The pulse section: everything but the histories, which are pulse.csv. */
function pulseSummary(pulse: PulseResult): object {
  const { history, ...rest } = pulse
  return { ...rest, samples: history.time.length }
}
