/**
 * The measured pulse through the comparison of readings: shown beside the program, never a gate.
 *
 * Data: test/published/measured-pulse.json, with its source and licence. The numbers do not fit one another: with the measured energy no thin
 * ring of plausible radius reaches the measured speed. No circulation, ring radius or core radius was measured, and none is validated. What
 * is tested is that the readings go through, and that the verdict on the speed is the one the data call for.
 */
import { expect, it } from 'vitest'
import { at } from '../../../../core/base'
import { READINGS_DEFAULTS } from '../../../../core/plan'
import type { PulseInput } from '../../../../core/pulse'
import { compareReadings } from '../../../../core/tank'
import measured from '../../../published/measured-pulse.json'
import { expectClose } from '../../../support/close'
import { CONSTANT, PLAIN, TUBE } from '../../pulse/plans'
import { NO_ROW } from './made'

const { inputs } = measured
const unit = inputs.accelerationTime.value
const diameter = inputs.diameter.value
const pulse: PulseInput = {
  ...PLAIN,
  density: inputs.density.value,
  kinematicViscosity: inputs.kinematicViscosity.value,
  nozzle: { ...TUBE, diameter, pistonDiameter: diameter },
  programme: {
    ...CONSTANT,
    shape: 'table',
    rows: measured.programme.rows.map((row) => ({
      time: at(row, 0) * unit,
      speed: at(row, 1) * inputs.peakSpeed.value,
    })),
  },
}
/** One standard deviation of the medians about a line, from the data's own note. */
const SIGMA = 0.03 * diameter

it('the measured track is fitted, and its speed lies above the predicted band (shown)', () => {
  const rows = measured.measured.trajectory.rows.map((row) => ({
    ...NO_ROW,
    time: at(row, 0) * unit,
    x: at(row, 1) * diameter,
    sigmaX: SIGMA,
  }))
  const result = compareReadings({
    section: { ...READINGS_DEFAULTS, rows },
    pulse,
    ageing: 'auto',
    walls: null,
    water: null,
    train: null,
    meanThrust: null,
    leak: 0,
    fields: null,
  })
  console.info(
    [
      'X05, X06 (shown, never a gate)',
      `fitted: ${result.fitted.join(', ')}; held: ${result.held.map(({ reason }) => reason).join(' ')}`,
      `circulation that the thin law needs for this track at the planned radius: ${JSON.stringify(result.fit.circulation)} m2/s, predicted ${result.prediction.circulation?.value}`,
      ...result.verdicts.map(({ text }) => text),
      ...result.notes,
    ].join('\n'),
  )
  expect(result.status).toBe('done')
  // 16 medians, 5 of them before the programme's end at 2.6 T.
  expect(result.rows).toBe(11)
  const speed = result.verdicts.find(({ quantity }) => quantity === 'speed')
  // Printed with the data: 0.0645 m/s over 1 to 8 T, slopes falling from 0.0677 to 0.0620; here 3 to 8 T.
  expectClose(speed?.measured.value ?? NaN, measured.measured.ringSpeed.value, 0.05)
  expect(speed?.state).toBe('outside')
  expect(speed?.outsideShare ?? NaN).toBeGreaterThan(0)
  // The fitted way runs through the medians as closely as a line does.
  expect(result.residualRms ?? NaN).toBeLessThan(SIGMA)
})
