import type { WasmMemory } from './webAssembly'

type CoaxialSum = (
  targets: number,
  pairs: number,
  rings: number,
  ringCount: number,
  sums: number,
  firstSelf: number,
) => void
type PlainSum = (targets: number, groups: number, sources: number, sourceCount: number, sums: number) => void

/** What core/kernel/assembly/index.ts exports; addresses are byte offsets into `memory`. */
export interface KernelExports {
  readonly memory: WasmMemory
  readonly coaxialVelocity: CoaxialSum
  readonly coaxialStream: CoaxialSum
  readonly addCoaxialVelocity: PlainSum
  readonly segmentVelocity: PlainSum
  readonly segmentVelocityMixed: PlainSum
  readonly shortenSegments: (segments: number, segmentCount: number) => void
  readonly treeTables: (
    order: number,
    terms: number,
    below: number,
    places: number,
    termAt: number,
    chain: number,
    recurrence: number,
    work: number,
  ) => void
  readonly momentsOfSegments: (moments: number, middle: number, segments: number, from: number, to: number) => void
  readonly momentsOfPart: (whole: number, part: number, x: number, y: number, z: number) => void
  readonly localOfPart: (part: number, whole: number, x: number, y: number, z: number) => void
  readonly localOfCells: (
    local: number,
    target: number,
    cells: number,
    moments: number,
    list: number,
    count: number,
  ) => void
  readonly velocityOfLocal: (local: number, middle: number, targets: number, pairs: number, sums: number) => void
}

const FUNCTIONS = [
  'addCoaxialVelocity',
  'coaxialVelocity',
  'coaxialStream',
  'segmentVelocity',
  'segmentVelocityMixed',
  'shortenSegments',
  'treeTables',
  'momentsOfSegments',
  'momentsOfPart',
  'localOfPart',
  'localOfCells',
  'velocityOfLocal',
]

/** The module's exports with their types. @throws {TypeError} if one is missing: the module is not the one built here. */
export function decodeKernelExports(exports: Readonly<Record<string, unknown>>): KernelExports {
  for (const name of FUNCTIONS) {
    if (typeof exports[name] !== 'function') throw new TypeError(`the kernel module has no function ${name}`)
  }
  const memory = exports.memory
  if (
    typeof memory !== 'object' ||
    memory === null ||
    !('buffer' in memory) ||
    !(memory.buffer instanceof ArrayBuffer)
  ) {
    throw new TypeError('the kernel module has no memory')
  }
  return exports as unknown as KernelExports
}
