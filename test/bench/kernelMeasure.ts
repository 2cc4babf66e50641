import { Worker } from 'node:worker_threads'
import {
  loadKernel,
  startKernelPool,
  typescriptKernel,
  type CoaxialInput,
  type Kernel,
  type SegmentInput,
} from '../../core/kernel'
import { uniform } from '../core/kernel/rings'
import { ringScene, rolledSheet } from '../core/kernel/scene'
import { withLimits, type KernelLimit, type Width } from './kernelLimit'
import { workerPort } from './kernelWorker'
import { interleaved, processorTime, wallTime } from './kernelTiming'
import type { Figure } from './measure'

/*
 * The measuring program of the kernel's figures, bundled and started by kernel.ts:
 *
 *   node kernelMeasure.mjs THREAD_SCRIPT C_SOURCE
 *
 * prints the figures as one line of JSON.
 */

/** Points of the pair sums, and how many rounds they are measured. */
const SEGMENTS = 1200
const RINGS = 600
const ROUNDS = 31

/**
 * A is the sum over segments, B the one over coaxial rings. Processor time of one thread, medians of jobs that take turns,
 * after 60 calls each; the threads by the clock. Throws when implementations that must agree do not, since figures of
 * different sums are worth nothing.
 */
async function measure(threadScript: string, limitSource: string): Promise<readonly Figure[]> {
  const wasm = await loadKernel()
  if (wasm.name !== 'wasm') throw new Error('the bench of the kernel needs WebAssembly')
  return [
    ...withLimits(limitSource, (limits) => pairSums(wasm, limits)),
    ...(await threads(wasm, threadScript)),
    ...segmentTrees(wasm),
    ...coaxialTrees(wasm),
  ]
}

/** The data of kernel.c, drawn in the same order. */
function sameData(count: number): { segments: SegmentInput; rings: CoaxialInput } {
  const random = uniform(1)
  const segments = new Float64Array(8 * count)
  const targets = new Float64Array(3 * count)
  const column = (): Float64Array => new Float64Array(count)
  const [x, r, circulation, deltaSquared, targetX, targetR] = [
    column(),
    column(),
    column(),
    column(),
    column(),
    column(),
  ]
  for (let i = 0; i < count; i++) {
    const source = [random(), 0.1 + random(), random(), random(), random(), random()]
    const target = [random(), 0.1 + random(), random()]
    segments.set([...source, 0.01, 0], 8 * i)
    targets.set(target, 3 * i)
    x[i] = source[0] ?? NaN
    r[i] = source[1] ?? NaN
    circulation[i] = Math.PI * (source[3] ?? NaN)
    deltaSquared[i] = 0.01
    targetX[i] = target[0] ?? NaN
    targetR[i] = target[1] ?? NaN
  }
  const rings = { count, x, r, circulation, deltaSquared }
  return {
    segments: { targetCount: count, targets, targetDeltaSquared: null, segmentCount: count, segments },
    rings: { targetCount: count, targetX, targetR, targetDeltaSquared: null, rings, skipSelf: false },
  }
}

function pairSums(wasm: Kernel, limits: Readonly<Record<Width, KernelLimit>> | null): readonly Figure[] {
  const { segments } = sameData(SEGMENTS)
  const { rings } = sameData(RINGS)
  const out = new Float64Array(3 * SEGMENTS)
  const velocity = { axial: new Float64Array(RINGS), radial: new Float64Array(RINGS) }
  const limitJob = (width: Width, what: 'segments' | 'rings', count: number, sum: () => number) => (): number => {
    if (limits === null) return NaN
    const run = limits[width].run(what, count, 3)
    const expected = sum()
    // -ffast-math reorders the sums, and the usual form in K and E cancels a little.
    if (!(Math.abs(run.sum - expected) <= 1e-9 * Math.abs(expected))) {
      throw new Error(`kernel.c gives ${run.sum} for ${what}, the kernel ${expected}`)
    }
    return run.secondsAPair
  }
  const total = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0)
  const segmentSum = (): number => total(out)
  const ringSum = (): number => total(velocity.axial) + total(velocity.radial)
  const seconds = interleaved(
    {
      scriptA: () => typescriptKernel.segmentVelocity(segments, out),
      wasmA: () => wasm.segmentVelocity(segments, out),
      narrowA: limitJob('128 bits', 'segments', SEGMENTS, segmentSum),
      wideA: limitJob('AVX2', 'segments', SEGMENTS, segmentSum),
      scriptB: () => typescriptKernel.coaxialVelocity(rings, velocity),
      wasmB: () => wasm.coaxialVelocity(rings, velocity),
      narrowB: limitJob('128 bits', 'rings', RINGS, ringSum),
      wideB: limitJob('AVX2', 'rings', RINGS, ringSum),
      mixedA: () => wasm.segmentVelocity({ ...segments, precision: 'mixed' }, out),
      streamB: () => wasm.coaxialStream(rings, velocity.axial),
    },
    ROUNDS,
    processorTime,
  )
  const [pairsA, pairsB] = [SEGMENTS ** 2, RINGS ** 2]
  const ratio = (name: string, value: number, goal: number | null): Figure => row(name, value, 'times', ROUNDS, goal)
  const rows = [
    row('kernel A: WebAssembly, a pair', (1e9 * seconds('wasmA')) / pairsA, 'ns', ROUNDS, null),
    row('kernel A: WebAssembly in mixed precision, a pair', (1e9 * seconds('mixedA')) / pairsA, 'ns', ROUNDS, null),
    row('kernel B: WebAssembly, a pair', (1e9 * seconds('wasmB')) / pairsB, 'ns', ROUNDS, null),
    row('kernel B: WebAssembly, stream function, a pair', (1e9 * seconds('streamB')) / pairsB, 'ns', ROUNDS, null),
    ratio('kernel A: WebAssembly against TypeScript', seconds('scriptA') / seconds('wasmA'), 2.5),
    ratio('kernel B: WebAssembly against TypeScript', seconds('scriptB') / seconds('wasmB'), 3.2),
  ]
  if (limits === null) return rows
  return [
    ...rows,
    ratio('kernel A: WebAssembly against C at 128 bits', (seconds('narrowA') * pairsA) / seconds('wasmA'), 0.9),
    ratio('kernel B: WebAssembly against C at 128 bits', (seconds('narrowB') * pairsB) / seconds('wasmB'), 1.4),
    ratio('kernel A: WebAssembly against C with AVX2', (seconds('wideA') * pairsA) / seconds('wasmA'), 0.45),
    ratio('kernel B: WebAssembly against C with AVX2', (seconds('wideB') * pairsB) / seconds('wasmB'), 0.55),
  ]
}

async function threads(wasm: Kernel, script: string): Promise<readonly Figure[]> {
  const pool = await startKernelPool(wasm, 2, () => workerPort(new Worker(script)))
  if (pool === null) throw new Error('the second thread did not start')
  try {
    const { segments } = sameData(4000)
    const [one, two] = [new Float64Array(12_000), new Float64Array(12_000)]
    const rounds = 25
    const seconds = interleaved(
      { one: () => wasm.segmentVelocity(segments, one), two: () => pool.segmentVelocity(segments, two) },
      rounds,
      wallTime,
    )
    if (!one.every((value, i) => Object.is(value, two[i]))) throw new Error('two threads differ from one')
    // The goal is for an idle machine: the quietest round of each is the nearest to one.
    const quietest = (values: readonly number[]): number => Math.min(...values)
    const ratio = seconds('one', quietest) / seconds('two', quietest)
    return [row('kernel A: two threads, 4000 targets, quietest rounds', ratio, 'times', rounds, 1.8)]
  } finally {
    pool.close()
  }
}

function segmentTrees(wasm: Kernel): readonly Figure[] {
  return [
    { rings: 64, tolerance: 1e-4, goal: 6 },
    { rings: 64, tolerance: 1.5e-6, goal: 2.5 },
    { rings: 256, tolerance: 1e-4, goal: 15 },
    { rings: 256, tolerance: 1e-6, goal: 6 },
  ].map(({ rings, tolerance, goal }) => {
    const input = ringScene(rings, 256, false, 12345)
    const count = input.targetCount
    const [tree, plain] = [new Float64Array(3 * count), new Float64Array(3 * count)]
    // The plain sum costs the same for each target: an even part of them is enough to time it.
    const parts = count > 20_000 ? 8 : 1
    const rounds = 5
    const seconds = interleaved(
      {
        plain: () => wasm.segmentVelocity({ ...input, targetCount: count / parts }, plain),
        tree: () => {
          wasm.segmentVelocityWithin(input, tolerance, tree, false)
        },
      },
      rounds,
      processorTime,
      3,
    )
    const error = relative(tree, plain, (3 * count) / parts)
    if (!(error <= 1.5 * tolerance)) throw new Error(`the tree's error is ${error}, asked for ${tolerance}`)
    const name = `kernel A: tree, ${count} segments of rings, rms ${tolerance}, against plain`
    return row(name, (parts * seconds('plain')) / seconds('tree'), 'times', rounds, goal)
  })
}

function coaxialTrees(wasm: Kernel): readonly Figure[] {
  return [
    { tolerance: 1e-4, goal: 15 },
    { tolerance: 3e-8, goal: 6 },
  ].map(({ tolerance, goal }) => {
    const input = rolledSheet(10_000, false)
    const room = (): { axial: Float64Array; radial: Float64Array } => ({
      axial: new Float64Array(10_000),
      radial: new Float64Array(10_000),
    })
    const [tree, plain] = [room(), room()]
    const rounds = 7
    const seconds = interleaved(
      {
        plain: () => wasm.coaxialVelocity(input, plain),
        tree: () => {
          wasm.coaxialVelocityWithin(input, tolerance, tree, false)
        },
      },
      rounds,
      processorTime,
      5,
    )
    const both = (u: typeof tree): Float64Array => Float64Array.from([...u.axial, ...u.radial])
    const error = relative(both(tree), both(plain), 20_000)
    if (!(error <= 1.5 * tolerance)) throw new Error(`the tree's error is ${error}, asked for ${tolerance}`)
    const name = `kernel B: tree, 10000 rings of a rolled sheet, rms ${tolerance}, against plain`
    return row(name, seconds('plain') / seconds('tree'), 'times', rounds, goal)
  })
}

function relative(got: Float64Array, expected: Float64Array, count: number): number {
  let [difference, size] = [0, 0]
  for (let i = 0; i < count; i++) {
    difference += ((got[i] ?? NaN) - (expected[i] ?? NaN)) ** 2
    size += (expected[i] ?? NaN) ** 2
  }
  return Math.sqrt(difference / size)
}

function row(name: string, value: number, unit: string, n: number, goal: number | null): Figure {
  return { name, value, unit, n, goal: goal === null ? null : { atLeast: goal } }
}

const [threadScript, limitSource] = process.argv.slice(2)
if (threadScript === undefined || limitSource === undefined) throw new Error('two paths are needed')
process.stdout.write(`${JSON.stringify(await measure(threadScript, limitSource))}\n`)
