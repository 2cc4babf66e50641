/** Parts of the run sheet: how to set the piston, the triggers and the camera, and what to expect at the stations. */
import type { Plan, SpreadQuantity, Units } from '../plan'
import { formatNumber, formatQuantity, formatRange, fromBase } from '../quantity'
import type { TankArrival, TankRunResult } from '../tank'
import type { DocumentBlock } from './document/types'

/** A number in a shown unit, without it; '' where there is none. */
export function shownNumber(value: number | null, unit: string, digits = 4): string {
  return value === null ? '' : formatNumber(fromBase(value, unit), digits)
}

/** Kept on one line. */
function unbroken(text: string): string {
  return text.replaceAll(' ', '\u00a0')
}

export function pistonBlocks(plan: Plan, { profile }: TankRunResult, units: Units): DocumentBlock[] {
  const { length, speed, acceleration, jerk, rampTime, wakeTime } = units
  return [
    { kind: 'heading', text: 'Piston settings' },
    {
      kind: 'pairs',
      rows: [
        ['Piston diameter', formatQuantity(plan.nozzle.pistonDiameter, length)],
        ['Piston travel', formatQuantity(profile.travel, length)],
        ['Highest piston speed', formatQuantity(profile.peakSpeed, speed)],
        ['Highest acceleration', formatQuantity(profile.peakAcceleration, acceleration)],
        ['Highest jerk', formatQuantity(profile.peakJerk, jerk)],
        ['Duration of the motion', formatQuantity(profile.duration, wakeTime)],
        ['Controller step', formatQuantity(profile.controllerStep, rampTime)],
        ['Rows of profile.csv', String(profile.time.length)],
        ['Command to motion', formatQuantity(profile.lag, rampTime)],
        ['Leak past the piston', `${formatNumber(100 * (plan.tankRun?.drive.leak ?? 0), 3)} %`],
      ],
    },
    ...profile.limits.map(({ ok, text }): DocumentBlock =>
      ok ? { kind: 'paragraph', tone: 'small', text } : { kind: 'paragraph', tone: 'limit', text: `Broken: ${text}` },
    ),
    { kind: 'paragraph', tone: 'small', text: profile.rounding.text },
  ]
}

export function triggerBlocks({ triggers }: TankRunResult, { wakeTime }: Units): DocumentBlock[] {
  const heading = (words: string) => ({ title: `${words} (${wakeTime})`, numeric: true })
  return [
    { kind: 'heading', text: 'Triggers' },
    {
      kind: 'table',
      caption: null,
      columns: [
        { title: 'Device' },
        heading('After command'),
        heading('After motion'),
        heading('Earliest'),
        heading('Latest'),
        { title: 'What' },
        { title: 'Set', blank: true },
      ],
      rows: triggers.map(({ device, afterCommand, time, early, late, text }) => [
        unbroken(device),
        ...[afterCommand, time, early, late].map((value) => shownNumber(value, wakeTime)),
        text,
        '',
      ]),
    },
  ]
}

/** @param spread figures of the spread; the arrivals among them are told */
export function stationBlocks(
  { arrivals }: TankRunResult,
  units: Units,
  spread: readonly SpreadQuantity[],
): DocumentBlock[] {
  if (arrivals.length === 0) return []
  const { length, wakeTime, ringSpeed } = units
  const scatter = arrivals.map((_, i) => spread.find(({ path }) => path === `tankRun.arrivals.${i}.time`) ?? null)
  const scattered = scatter.some((row) => row !== null)
  return [
    { kind: 'heading', text: 'Expected at the stations' },
    {
      kind: 'table',
      caption: `Times after the piston starts. The tolerance spans the models that may hold, of ageing and of the start${
        scattered
          ? '; 5 to 95 % is the scatter of the stated uncertainties about the value.'
          : '; it is not the scatter of the plan.'
      }`,
      columns: [
        { title: `Station (${length})`, numeric: true },
        { title: `Time (${wakeTime})`, numeric: true },
        { title: 'Tolerance', numeric: true },
        ...(scattered ? [{ title: `5 to 95 % (${wakeTime})`, numeric: true }] : []),
        { title: `Speed (${ringSpeed})`, numeric: true },
        { title: `Radius (${length})`, numeric: true },
        { title: `Read: time (${wakeTime})`, blank: true },
        { title: `Read: radius (${length})`, blank: true },
      ],
      rows: arrivals.map((row, i) => [
        shownNumber(row.station, length),
        row.time === null ? unbroken('not seen') : shownNumber(row.time, wakeTime, 3),
        toleranceText(row, wakeTime),
        ...(scattered ? [scatterText(scatter[i] ?? null, wakeTime)] : []),
        row.speed === null ? '' : formatRange(row.speedLow ?? row.speed, row.speedHigh ?? row.speed, ringSpeed).text,
        shownNumber(row.radius, length, 3),
        '',
        '',
      ]),
    },
    ...arrivals.flatMap(({ station, reason }): DocumentBlock[] =>
      reason === null
        ? []
        : [{ kind: 'paragraph', tone: 'small', text: `Station ${formatQuantity(station, length)}: ${reason}.` }],
    ),
  ]
}

function scatterText(row: SpreadQuantity | null, unit: string): string {
  return row === null || row.p05 === null || row.p95 === null ? '' : unbroken(formatRange(row.p05, row.p95, unit).text)
}

/** `−0.30 to +0.07`, from the time told. */
function toleranceText({ time, timeLow, timeHigh }: TankArrival, unit: string): string {
  if (time === null || timeLow === null || timeHigh === null) return ''
  const digits = (value: number): string => fromBase(value, unit).toFixed(2)
  return unbroken(`−${digits(time - timeLow)} to +${digits(timeHigh - time)}`)
}

export function cameraBlocks({ imaging, storage }: TankRunResult, units: Units): DocumentBlock[] {
  const { length, rampTime, frequency, imageScale } = units
  const field = imaging.fieldOfView
  const told = (name: string, value: number | null, words: (value: number) => string): [string, string][] =>
    value === null ? [] : [[name, words(value)]]
  return [
    { kind: 'heading', text: 'Camera and light' },
    {
      kind: 'pairs',
      rows: [
        ...told('Field', field?.[0] ?? null, (along) =>
          [along, field?.[1] ?? 0]
            .map((side) => shownNumber(side, length, 3))
            .join(' × ')
            .concat(` ${length}`),
        ),
        ...told('Scale', imaging.scale, (scale) => formatQuantity(scale, imageScale, 3)),
        ...told('Pair interval', imaging.pairInterval, (time) => formatQuantity(time, rampTime, 3)),
        ...told('Frame rate', imaging.frameRate, (rate) => formatQuantity(rate, frequency, 3)),
        ...told('Frame pairs', imaging.pairs, (pairs) => `${pairs}, two frames each`),
        ...told('Recording', recordingOf(imaging), (time) => formatQuantity(time, 's', 3)),
        ...told('Store of a run', storage, bytesText),
        ...told('Light sheet', imaging.sheetThickness, (thickness) => formatQuantity(thickness, length, 2)),
        ...told('Depth of field', imaging.depthOfField, (depth) => formatQuantity(depth, length, 2)),
        ...told('Seeding', imaging.seeding, (density) => `${formatNumber(density / 1e6, 2)} particles a cm³`),
        ...told('Scale in water over dry', imaging.refraction?.waterOverAirScale ?? null, (factor) =>
          formatNumber(factor, 4),
        ),
      ],
    },
  ]
}

/** From the first frame to the last [s]. */
function recordingOf({ pairs, pairRate, pairInterval }: TankRunResult['imaging']): number | null {
  return pairs === null || pairRate === null ? null : (pairs - 1) / pairRate + (pairInterval ?? 0)
}

/** `174 MB`, `6.27 GB`. */
export function bytesText(bytes: number): string {
  return bytes >= 1e9 ? `${formatNumber(bytes / 1e9, 3)} GB` : `${formatNumber(bytes / 1e6, 3)} MB`
}
