/** What a fit of one ring gives. */
import type { WakeAgeing } from '../../coaxial'
import type { HeldParameter } from './identify'
import type { MeasuredQuantity } from './measurements'
import type { RingStart } from './pathModel'
import type { FitName } from './types'

export interface FittedValue {
  readonly value: number
  readonly standardError: number
}

export interface ReadingResidual {
  /** Index in the rows given. */
  readonly row: number
  readonly quantity: MeasuredQuantity
  readonly time: number
  readonly measured: number
  readonly model: number
  /** measured - model, in the quantity's unit. */
  readonly residual: number
  /** Residual over the robust scatter of its quantity. */
  readonly normalised: number
  /** Above 3.5 in size: marked, and still in the fit. */
  readonly outlier: boolean
}

export interface RingFit {
  readonly status: 'done' | 'failed'
  readonly message: string
  readonly ageing: WakeAgeing
  /** What was fitted, in the order of the correlations. */
  readonly fitted: readonly FitName[]
  readonly fit: Readonly<Partial<Record<FitName, FittedValue>>>
  readonly held: readonly HeldParameter[]
  /** The ring with what was fitted and what was held. */
  readonly ring: RingStart
  readonly correlation: readonly (readonly number[])[]
  /** Half width of a 95 % interval over the standard error: 1.96, or Student's where the scatter had to be estimated. */
  readonly intervalFactor: number
  /** Where the uncertainties come from. */
  readonly sigma: 'given' | 'estimated' | 'mixed'
  readonly degreesOfFreedom: number
  /** Sum of squares over degrees of freedom with the uncertainties given; null where any was estimated. */
  readonly reducedChiSquare: number | null
  /** Of the places [m]; null where none was read. */
  readonly residualRms: number | null
  readonly residuals: readonly ReadingResidual[]
  /** Rows in the fit, and rows left out because the ring was still forming. */
  readonly rows: number
  readonly forming: number
  readonly iterations: number
  /** One sentence each. */
  readonly notes: readonly string[]
}
