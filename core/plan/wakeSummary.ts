/** The wake section of the summary. */
import { wakeSummary, type Wake } from '../filament'

/** The wake with what belongs beside it. */
export interface WakeOutcome {
  readonly wake: Wake
  readonly ageing: string
  readonly arrivals: readonly object[]
  readonly notes: readonly string[]
}

export function wakeSectionSummary({ wake, ageing, arrivals, notes }: WakeOutcome): object {
  const { status, message, time, counters, modelReason } = wake
  return {
    ...wakeSummary(wake),
    modelReason,
    ageing,
    arrivals,
    status,
    message,
    time,
    counters,
    notes: [...notes, ...wake.notes],
  }
}
