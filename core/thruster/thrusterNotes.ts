/**
 * What has to be said beside the results of a thruster.
 */
import { FRICTION_LINE_FROM } from './drag'
import type { ThrusterInput, ThrusterNote, ThrusterResult } from './resultTypes'
import type { StrokeMoments } from './shapeMoments'
import { CLOSE_RINGS } from './vectoring'

/** Loss by neighbours that is worth a note. */
const LOSS_WORTH_TELLING = 0.005
/** Change of speed by one pulse over the cruise speed above which the mean balance is coarse: common practice. */
const COARSE_STEP = 0.2

/** Stream over peak exit speed up to which formation numbers were measured (Zhu, Zhang, Gao & Yu 2023, J. Fluid Mech.). */
const STRONGEST_STREAM = 0.5

const figures = (value: number): string => String(Number(value.toPrecision(3)))
const percent = (share: number): string => `${figures(100 * share)} %`

/** Notes in the order of importance. */
export function thrusterNotes(
  input: ThrusterInput,
  result: Omit<ThrusterResult, 'notes'>,
  moments: StrokeMoments,
): ThrusterNote[] {
  const notes: ThrusterNote[] = []
  const say = (id: ThrusterNote['id'], text: string | null): void => {
    if (text !== null) notes.push({ id, text })
  }
  say('thruster-does-not-start', doesNotStart(input, result))
  say('thruster-shortfall', shortfalls(input, result))
  say('thruster-several-speeds', severalSpeeds(result))
  say('thruster-limits', brokenLimits(result))
  say('thruster-speed-jumps', jumps(input, moments))
  say(
    'thruster-no-column',
    input.pulse.nozzle.length === 0
      ? 'The nozzle has no length given, so the inertia of the water in it costs nothing here: give nozzle.length.'
      : null,
  )
  say('thruster-braking-suction', brakingSuction(input, result))
  say(
    'thruster-close-nozzles',
    result.proximityLoss >= LOSS_WORTH_TELLING
      ? `The nozzles stand close: neighbours may cost up to ${percent(result.proximityLoss)} of the thrust, which is in the low end of the range and not in the mean.`
      : null,
  )
  say('thruster-close-rings', closeRings(result))
  say('thruster-past-ring', pastRing(result))
  say('thruster-strong-stream', strongStream(result))
  say(
    'thruster-refill-by-exit',
    input.section.intake.area === null
      ? 'The cavity refills through the exit itself: still water is counted on there, though part of the jet may be drawn in again.'
      : null,
  )
  say('thruster-hull-reynolds', hullReynolds(input, result))
  say('thruster-light-vehicle', lightVehicle(input, result))
  say(
    'thruster-no-added-mass',
    result.startUp !== null && (input.section.vehicle?.addedMass ?? null) === null
      ? 'No added mass is given: the water that moves with the vehicle is left out, and it takes longer to get going than told.'
      : null,
  )
  const { jet, axialFlow } = input.pulse
  const stream = input.section.vehicle === null ? axialFlow : result.speed
  say(
    'thruster-jet-other-stream',
    jet !== null && stream !== axialFlow
      ? `The computed starting jet stands in a stream of ${figures(axialFlow)} m/s, the thruster in ${figures(stream)} m/s.`
      : null,
  )
  return notes
}

function doesNotStart({ section }: ThrusterInput, { cruise }: Pick<ThrusterResult, 'cruise'>): string | null {
  if (section.vehicle === null || cruise === null || cruise.fromRest !== 0) return null
  return `The vehicle does not start from rest: drag at rest is ${figures(-cruise.excessAtRest)} N above the mean thrust.`
}

function shortfalls({ section }: ThrusterInput, result: Omit<ThrusterResult, 'notes'>): string | null {
  const sentences: string[] = []
  const held = section.vehicle?.speed ?? null
  if (held !== null && result.excessThrust !== null && result.excessThrust < 0)
    sentences.push(
      `At ${figures(held)} m/s the drag is ${figures(result.dragAtSpeed ?? 0)} N and the mean thrust ${figures(result.meanThrust)} N: ${figures(-result.excessThrust)} N are missing to hold it.`,
    )
  for (const { speed, thrust, needed, shortfall } of result.duties) {
    if (shortfall <= 0) continue
    const where = speed === null ? 'Standing,' : `At ${figures(speed)} m/s`
    sentences.push(
      `${where} ${figures(needed)} N are asked for and ${figures(thrust)} N given: ${figures(shortfall)} N are missing.`,
    )
  }
  return sentences.length === 0 ? null : sentences.join(' ')
}

function severalSpeeds({ cruise }: Pick<ThrusterResult, 'cruise'>): string | null {
  if (cruise === null || cruise.speeds.length < 2) return null
  const list = cruise.speeds.map(({ speed, stable }) => `${figures(speed)} m/s (${stable ? 'stable' : 'unstable'})`)
  return `Thrust meets drag at several speeds: ${list.join(', ')}. From rest the vehicle stays at the first stable one.`
}

function brokenLimits({ limits }: Pick<ThrusterResult, 'limits'>): string | null {
  const broken = [...new Set(limits.filter(({ ok }) => !ok).map(({ name }) => name))]
  return broken.length === 0 ? null : `Outside its limit: ${broken.join(', ')}.`
}

function jumps({ pulse }: ThrusterInput, moments: StrokeMoments): string | null {
  if (!moments.jumpUp && !moments.jumpDown) return null
  const water = pulse.nozzle.length > 0 ? ' and, with water in the nozzle, force without bound' : ''
  return `The programme's speed jumps, which asks the plunger for acceleration${water}: no actuator gives that. Ramps of finite time make the peaks real.`
}

function brakingSuction(input: ThrusterInput, result: Omit<ThrusterResult, 'notes'>): string | null {
  const { vapourPressure, absolutePressure } = input
  const lowest = absolutePressure + result.cavity.pressureLow
  if (vapourPressure === null || !Number.isFinite(lowest) || lowest > vapourPressure) return null
  return `Braking the water in the nozzle or refilling takes the cavity ${figures(-result.cavity.pressureLow)} Pa under the pressure outside, below vapour pressure: the column parts.`
}

function closeRings({ ringSpacing }: Pick<ThrusterResult, 'ringSpacing'>): string | null {
  if (ringSpacing === null || !ringSpacing.close) return null
  return `Rings follow each other ${figures(ringSpacing.ratio)} radii apart, nearer than ${CLOSE_RINGS}: they move each other, and their ways are those of a marched train.`
}

function pastRing({ ringShare, pulse }: Pick<ThrusterResult, 'ringShare' | 'pulse'>): string | null {
  const { low, high } = ringShare
  if (low === null || high === null || low >= 1) return null
  const shares = percent(low) === percent(high) ? percent(low) : `${percent(low)} to ${percent(high)}`
  return `The stroke of ${figures(pulse.strokeRatio)} D is past the low end of the formation numbers, ${figures(pulse.formationNumber.low ?? 0)}: ${shares} of the impulse goes into the ring, the rest trails. Thrust and power count both and do not move with it.`
}

function strongStream({ speed, pulse }: Pick<ThrusterResult, 'speed' | 'pulse'>): string | null {
  const ratio = speed / pulse.peakSpeed
  return ratio > STRONGEST_STREAM
    ? `The vehicle makes ${figures(ratio)} of the peak exit speed: formation numbers were measured in streams up to ${STRONGEST_STREAM} of it and are held there.`
    : null
}

function hullReynolds({ section, pulse }: ThrusterInput, { speed }: Pick<ThrusterResult, 'speed'>): string | null {
  const { vehicle } = section
  if (vehicle === null || vehicle.drag?.kind !== 'hull' || vehicle.length === null || speed === 0) return null
  const reynolds = (speed * vehicle.length) / pulse.kinematicViscosity
  return reynolds < FRICTION_LINE_FROM
    ? `The hull's Reynolds number ${figures(reynolds)} is below ${FRICTION_LINE_FROM}: the friction line is made for turbulent hulls and a stand-in here.`
    : null
}

function lightVehicle(input: ThrusterInput, result: Omit<ThrusterResult, 'notes'>): string | null {
  const { startUp, cruise } = result
  const cruiseSpeed = cruise?.fromRest ?? null
  if (startUp === null || cruiseSpeed === null) return null
  const together = input.section.inTurn ? 1 : input.section.count
  const step = (together * result.pulse.total.impulse) / startUp.movedMass / cruiseSpeed
  return step > COARSE_STEP
    ? `One pulse changes the vehicle's speed by ${percent(step)} of cruise: the balance of mean thrust and drag is coarse for so light a vehicle.`
    : null
}
