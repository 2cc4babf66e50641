/**
 * A plan becomes its text: two-space indent, stable key order, SI numbers, what this version does not know kept.
 */
import type { Json, JsonObject } from './json'
import { merged, pair } from './mergedDocument'
import { readingsDocument } from './readingsDocument'
import { COMPUTED_SECTIONS } from './sectionOrder'
import { heldDocument, spreadDocument, sweepDocument, tankRunDocument } from './tankRunDocument'
import { thrusterDocument } from './thrusterDocument'
import { PLAN_FORMAT, PLAN_VERSION, type Plan, type WakeSection } from './types'

/** Order of the sections in a file, as the contract lists them; unknown ones follow in their own order. */
const SECTION_ORDER = ['format', 'version', 'title', 'revision', 'notes', ...COMPUTED_SECTIONS, 'held', 'view'] as const

/** The document of a plan, as it is saved. */
export function planDocument(plan: Plan): JsonObject {
  const known: Record<string, Json | undefined> = {
    format: PLAN_FORMAT,
    version: PLAN_VERSION,
    title: plan.title,
    revision: plan.revision === '' ? undefined : plan.revision,
    notes: plan.notes,
    water: merged(plan.source['water'], {
      ...plan.water,
      density: plan.water.density ?? undefined,
      kinematicViscosity: plan.water.kinematicViscosity ?? undefined,
      vapourPressure: plan.water.vapourPressure ?? undefined,
    }),
    nozzle: plan.absent.includes('nozzle') ? undefined : merged(plan.source['nozzle'], { ...plan.nozzle }),
    programme: plan.absent.includes('programme')
      ? undefined
      : merged(plan.source['programme'], {
          ...plan.programme,
          rows: plan.programme.rows.length === 0 ? undefined : plan.programme.rows.map((row) => ({ ...row })),
        }),
    ambient: merged(plan.source['ambient'], { ...plan.ambient }),
    models: merged(plan.source['models'], { ...plan.models }),
    jet: plan.jet === null ? undefined : merged(plan.source['jet'], { ...plan.jet }),
    train: plan.train === null ? undefined : merged(plan.source['train'], { ...plan.train }),
    wake: plan.wake === null ? undefined : merged(plan.source['wake'], wakeDocument(plan.wake)),
    thruster: plan.thruster === null ? undefined : thrusterDocument(plan.source['thruster'], plan.thruster),
    tankRun: plan.tankRun === null ? undefined : tankRunDocument(plan.source['tankRun'], plan.tankRun),
    readings: plan.readings === null ? undefined : readingsDocument(plan.source['readings'], plan.readings),
    sweep: plan.sweep === null ? undefined : sweepDocument(plan.source['sweep'], plan.sweep),
    spread: plan.spread === null ? undefined : spreadDocument(plan.source['spread'], plan.spread),
    held: heldDocument(plan.source['held'], plan.held),
    view: merged(plan.source['view'], { units: { ...plan.view.units } }),
  }
  const all: Record<string, Json | undefined> = { ...plan.source, ...known }
  const order: readonly string[] = SECTION_ORDER
  const keys = [...order, ...Object.keys(all).filter((key) => !order.includes(key))]
  return Object.fromEntries(keys.flatMap((key) => pair(key, all[key])))
}

function wakeDocument(wake: WakeSection): Readonly<Record<string, Json>> {
  const { rings, nozzles, wall, ...rest } = wake
  return {
    ...rest,
    rings: rings.map(({ curve, ...ring }) => (curve === undefined ? { ...ring } : { ...ring, curve: nodesOf(curve) })),
    nozzles: nozzles.map((nozzle) => ({ ...nozzle })),
    wall: wall === null ? null : { ...wall },
  }
}

function nodesOf(curve: Float64Array): number[][] {
  return Array.from({ length: curve.length / 3 }, (_, i) => [...curve.subarray(3 * i, 3 * i + 3)])
}

/** The text of a plan file, with its trailing newline. */
export function writePlan(plan: Plan): string {
  return `${JSON.stringify(planDocument(plan), null, 2)}\n`
}

/**
 * What decides the results of a plan, as one text to be hashed: the document without title, revision, notes and view.
 * Two plans with the same text compute the same numbers.
 */
export function canonicalInput(plan: Plan): string {
  const beside = new Set(['title', 'revision', 'notes', 'view', 'held'])
  return JSON.stringify(Object.fromEntries(Object.entries(planDocument(plan)).filter(([key]) => !beside.has(key))))
}

/** File name offered for a plan: its title in plain letters, never empty. */
export function planFileName(title: string): string {
  const plain = title
    .normalize('NFKD')
    .replace(/\p{M}+/gu, '')
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '')
    .toLowerCase()
  return `${plain === '' ? 'plan' : plain.slice(0, 60)}.ringwright.json`
}
