import { beforeAll, describe, expect, it } from 'vitest'
import { EXAMPLES, examplePlan, planDocument, setRevision, setUnit, type Json, type Plan } from '../../../core/plan'
import { designRecord, documentHtml, type DocumentBlock, type PrintDocument } from '../../../core/report'
import { recordExplanations } from '../../../core/report/record/formulas'
import { inputGroups } from '../../../core/report/record/inputRows'
import { showOf } from '../../../core/report/record/show'
import { sourceList } from '../../../core/report/record/sources'
import { availableSections, run, type RunData } from '../../../core/run'
import type { ThrusterResult } from '../../../core/thruster'

const META = { date: '4 June 2031', program: { name: 'Ringwright', version: '1.2.3' }, inputHash: 'ab'.repeat(32) }

async function computed(plan: Plan): Promise<RunData> {
  const { status, message, data } = await run(plan, { sections: availableSections(plan) })
  if (status !== 'done' || data === null) throw new Error(message)
  return data
}

/** Texts of a block as they are read, markup apart. */
function textsOf(block: DocumentBlock): readonly string[] {
  switch (block.kind) {
    case 'heading':
    case 'subheading':
    case 'paragraph':
      return [block.text]
    case 'list':
    case 'checklist':
      return block.items
    case 'table':
      return [block.caption ?? '', ...block.columns.map(({ title }) => title), ...block.rows.flat()]
    case 'pairs':
      return block.rows.flat()
    case 'figure':
    case 'formula':
      return [block.caption]
    case 'figures':
      return block.items.map(({ caption }) => caption)
    case 'derivation':
      return [block.title, ...block.rows.flat()]
    case 'boxes':
      return block.labels
    case 'lines':
      return [block.label]
    case 'pageBreak':
      return []
  }
}

function textOf(record: PrintDocument): string {
  return record.blocks.flatMap(textsOf).join('\n').replaceAll('\u00A0', ' ')
}

function headingsOf({ blocks }: PrintDocument): readonly string[] {
  return blocks.flatMap((block) => (block.kind === 'heading' ? [block.text] : []))
}

/** Dotted paths of everything a document holds; items of lists that are no objects stand under the list. */
function leaves(node: Json, path: string): readonly string[] {
  if (Array.isArray(node)) return [path]
  if (typeof node !== 'object' || node === null) return [path]
  return Object.entries(node).flatMap(([key, value]) => leaves(value, path === '' ? key : `${path}.${key}`))
}

const LOCAL = 'Follow local rules and let a qualified person decide.'
const BESIDE = /^(?:format|version|title|revision|notes|view|held|readings)\b/u

let vehicle: { plan: Plan; data: RunData; record: PrintDocument }
let tank: { plan: Plan; data: RunData; record: PrintDocument }
let wake: { plan: Plan; data: RunData; record: PrintDocument }

async function made(plan: Plan): Promise<{ plan: Plan; data: RunData; record: PrintDocument }> {
  const data = await computed(plan)
  return { plan, data, record: designRecord(plan, data, META) }
}

beforeAll(async () => {
  vehicle = await made(examplePlan('survey-vehicle'))
  tank = await made(examplePlan('tank-day'))
  wake = await made(examplePlan('three-ring-train'))
}, 30_000)

describe('the inputs of a record', () => {
  it.each(EXAMPLES.map(({ id }) => id))('hold every number, choice and list of the example %s', (id) => {
    const plan = examplePlan(id)
    const printed = new Set(
      inputGroups(plan, showOf(plan)).flatMap(({ rows, lists }) => [...rows, ...lists].map(({ path }) => path)),
    )
    const missing = leaves(planDocument(plan), '').filter((path) => {
      if (BESIDE.test(path)) return false
      // Ends of a span and sizes of a frame have a row each.
      return !printed.has(path) && !printed.has(`${path}.0`)
    })
    expect(missing).toEqual([])
  })

  it('are in the unit the plan shows, and in its own where none is chosen', () => {
    const plan = examplePlan('bench-generator')
    const valueOf = (shown: Plan, path: string): string | undefined =>
      inputGroups(shown, showOf(shown))
        .flatMap(({ rows }) => rows)
        .find((row) => row.path === path)
        ?.value.replaceAll('\u00A0', ' ')
    expect(valueOf(plan, 'nozzle.diameter')).toBe('25 mm')
    expect(valueOf(setUnit(plan, 'length', 'in'), 'nozzle.diameter')).toBe('0.984252 in')
    expect(valueOf(plan, 'programme.riseTime')).toBe('40 ms')
    expect(valueOf(plan, 'nozzle.shape')).toBe('tube')
  })

  it('tell apart what is not given and what this plan does not read', () => {
    const plan = examplePlan('inspection-thruster')
    const rows = inputGroups(plan, showOf(plan)).flatMap((group) => group.rows)
    const stateOf = (path: string) => rows.find((row) => row.path === path)?.state
    expect(stateOf('water.salinity')).toBe('read')
    expect(stateOf('nozzle.contraction')).toBe('moot')
    const fresh = examplePlan('tank-day')
    const text = textOf(tank.record)
    expect(fresh.water.kind).toBe('fresh')
    expect(text).toContain('Not read by this plan, as given or by default: Salinity 35')
    expect(text).toMatch(/Not given: .*largest jerk|Not given: Largest jerk/u)
  })
})

describe('the figures of thrusters in a record', () => {
  function printedOf(change: (result: ThrusterResult) => Partial<ThrusterResult>): string {
    const { plan, data } = vehicle
    if (data.thruster === null) throw new Error('no thruster')
    const { result } = data.thruster
    const thruster = { ...data.thruster, result: { ...result, ...change(result) } }
    return textOf(designRecord(plan, { ...data, thruster }, META))
  }

  it('show a balance that is met to rounding as nothing over, and a true excess as it is', () => {
    expect(printedOf(() => ({ dragAtSpeed: 2, excessThrust: -8.88e-16 }))).toMatch(/Excess of thrust over drag\n0 /u)
    expect(printedOf(() => ({ dragAtSpeed: 2, excessThrust: -0.00724 }))).toMatch(
      /Excess of thrust over drag\n[-−]7\.24 mN/u,
    )
  })

  it('speak of close neighbours only where their loss is in the range', () => {
    expect(printedOf(() => ({ proximityLoss: 0.02 }))).toContain('slug with the loss of close neighbours, to slug')
    expect(printedOf(() => ({ proximityLoss: 0 }))).not.toContain('slug with the loss of close neighbours')
  })

  it('say where the refill, not the stroke, makes the plunger fastest', () => {
    const faster = (times: number): string =>
      printedOf(({ plunger, pulse }) => ({ plunger: { ...plunger, speed: times * pulse.pistonPeakSpeed } }))
    expect(faster(1.5)).toContain('Peak plunger speed, while refilling')
    expect(faster(1)).not.toContain('while refilling')
  })

  it('have the water carried along among the parts of the power', () => {
    expect(printedOf(({ power }) => ({ power: { ...power, carried: 1, total: power.total + 2 } }))).toContain(
      'water carried along',
    )
    expect(textOf(vehicle.record)).not.toContain('water carried along')
  })
})

describe('the cautions of a record', () => {
  it.each(['vehicle', 'tank', 'wake'] as const)('are all there: none is lost in print (%s)', (which) => {
    const { data, record } = { vehicle, tank, wake }[which]
    const text = textOf(record)
    expect(data.cautions.length).toBeGreaterThan(0)
    for (const caution of data.cautions) {
      // A sentence that all of a group share stands once, above them.
      const own = caution.text.replace(` ${LOCAL}`, '')
      expect(text).toContain(own.replaceAll('\u00A0', ' '))
      expect(text).toContain(caution.source)
      if (own !== caution.text) expect(text).toContain(`For each of these: ${LOCAL}`)
    }
  })

  it('keep a last sentence that only some of a group share', () => {
    const [first, second] = tank.data.cautions.filter(({ group }) => group === 'machine')
    if (first === undefined || second === undefined) throw new Error('the example has no machine cautions')
    const other = { ...second, text: 'Something else. Ask first.' }
    const record = designRecord(tank.plan, { ...tank.data, cautions: [first, other] }, META)
    expect(textOf(record)).toContain(first.text)
    expect(textOf(record)).toContain(other.text)
  })
})

describe('the results of a record', () => {
  it('hold only what was computed', () => {
    const water = designRecord(tank.plan, { ...tank.data, pulse: null, tankRun: null, cautions: [] }, META)
    expect(headingsOf(water)).toEqual(['Summary', 'Inputs', 'Assumptions', 'Results', 'Sources'])
    expect(textOf(water)).not.toMatch(/Arrivals|Ring circulation|Mean thrust/u)
    expect(headingsOf(vehicle.record)).toEqual([
      'Summary',
      'Inputs',
      'Assumptions',
      'Results',
      'Limits',
      'Cautions',
      'Formulas',
      'Sources',
    ])
  })

  it('put the range before the adopted value, and both ends of it where the models differ', () => {
    const { pulse } = tank.data
    const table = tank.record.blocks.find((block) => block.kind === 'table' && block.columns[1]?.title === 'Range')
    if (table?.kind !== 'table' || pulse === null) throw new Error('the record has no table of ranges')
    expect(table.columns.map(({ title }) => title).slice(0, 3)).toEqual(['Figure', 'Range', 'Adopted'])
    const ring = table.rows.find(([name]) => name === 'Ring circulation') ?? []
    // 30.9 to 38.9 cm²/s: slug alone, and with the quick start.
    const ends = [pulse.ringFromSlug?.circulation ?? 0, pulse.ringWithOverPressure?.circulation ?? 0]
    const [low, high] = ends.map((value) => (value * 1e4).toPrecision(3))
    expect(ring[1]).toBe(`${low} to ${high}\u00A0cm²/s`)
  })

  it('tell every limit with its state, and broken ones in the summary by name', () => {
    const text = textOf(vehicle.record)
    expect(text).toContain('limits are broken: Thrust at duty point 2')
    for (const { name } of vehicle.data.thruster?.result.limits ?? []) expect(text.toLowerCase()).toContain(name)
    expect(textOf(tank.record)).toContain('limits that were checked hold')
  })

  it('list every candidate of the sizing, and the efficiencies by name', () => {
    const text = textOf(vehicle.record)
    const { candidates = [] } = vehicle.data.thruster?.sizing ?? {}
    expect(candidates.length).toBeGreaterThan(1)
    for (const [i] of candidates.entries()) expect(text).toContain(`No. ${i + 1}`)
    expect(text).toContain('Froude efficiency')
    expect(text).toContain('Overall efficiency')
  })

  it('give every ring of a wake at every station earliest, latest and adopted', () => {
    const { wake: outcome } = wake.data
    const table = wake.record.blocks.find((block) => block.kind === 'table' && /^Arrivals/u.test(block.caption ?? ''))
    if (table?.kind !== 'table') throw new Error('the record has no arrivals')
    expect(table.rows).toHaveLength(outcome?.arrivals.length ?? -1)
    expect(table.columns.map(({ title }) => title)).toEqual([
      'Ring',
      'Station (mm)',
      'Earliest (s)',
      'Latest (s)',
      'Adopted (s)',
    ])
  })

  it('draw every plot for white paper, each identifier once', () => {
    const html = documentHtml(tank.record, 'A4')
    const ids = [...html.matchAll(/ id="([^"]+)"/gu)].map(([, id]) => id)
    expect(new Set(ids).size).toBe(ids.length)
    // The grounds of the window's light and dark themes differ from white paper's rule.
    expect(html).not.toContain('#1A2129')
    expect(html.match(/<svg /gu)?.length).toBeGreaterThan(6)
  })
})

describe('the formulas and sources of a record', () => {
  it('explain every main figure with formula, source, range and verdict', () => {
    const { plan, data, record } = vehicle
    const explanations = recordExplanations({ plan, data, show: showOf(plan) })
    expect(explanations.length).toBeGreaterThan(15)
    const printed = record.blocks.filter((block) => block.kind === 'derivation')
    expect(printed.map(({ title }) => title)).toEqual(explanations.map(({ title }) => title))
    for (const { mathml, rows } of printed) {
      expect(mathml).toMatch(/^<math.*<\/math>$/u)
      expect(rows).toHaveLength(4)
    }
    const text = textOf(record)
    for (const { verdict } of explanations) expect(text).toContain(verdict.replaceAll('\u00A0', ' '))
  })

  it('name every publication once, in its longest form, and say where one was recalled', () => {
    const { references, others } = sourceList([
      'Gharib, Rambod & Shariff 1998 (recalled, not re-read); slug identity.',
      'After Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121.',
      'Walker et al. 1987; Orlandi & Verzicco 1993 (recalled, not re-read)',
      'typical of generators, de Guyon & Mulleners 2022.',
      'Keane & Adrian 1990 and 1992',
      'close neighbours: Athanassiadis & Hart 2016, arXiv 1604.05382.',
      'Vapour pressure: IAPWS-IF97, region 4.',
      'common practice',
      'common practice.',
    ])
    expect(references).toEqual([
      'Athanassiadis & Hart 2016, arXiv 1604.05382',
      'de Guyon & Mulleners 2022',
      'Gharib, Rambod & Shariff 1998, J. Fluid Mech. 360:121 (recalled, not re-read)',
      'IAPWS-IF97',
      'Keane & Adrian 1990',
      'Keane & Adrian 1992',
      'Orlandi & Verzicco 1993 (recalled, not re-read)',
      'Walker et al. 1987',
    ])
    expect(others).toEqual(['common practice'])
  })
})

describe('the title block of a record', () => {
  it('carries revision, date, program, hash and boxes to sign, and the revision in the kind', () => {
    const record = designRecord(setRevision(tank.plan, 'C'), tank.data, META)
    expect(record.kind).toBe('Design record, revision C')
    expect(Object.fromEntries(record.titleBlock)).toMatchObject({
      Revision: 'C',
      Date: '4 June 2031',
      Program: 'Ringwright 1.2.3',
    })
    expect(record.foot).toContain(META.inputHash)
    expect(record.blocks[0]).toMatchObject({ kind: 'boxes' })
    expect(designRecord(tank.plan, tank.data, META).kind).toBe('Design record')
  })

  it('stands in the foot of each page with its number, and no title breaks out of the style sheet', () => {
    const title = 'a"; } </style><script>alert(1)</script> \\'
    const html = documentHtml({ ...tank.record, title }, 'Letter')
    expect(html).not.toContain('<script>')
    expect(html.match(/<\/style>/gu)).toHaveLength(1)
    expect(html).toContain('counter(page)')
    expect(documentHtml(tank.record, null).includes('@page{margin')).toBe(true)
  })
})
