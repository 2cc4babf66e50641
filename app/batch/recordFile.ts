/**
 * The printable record of a run.
 */
import type { Plan } from '../../core/plan'
import { comparisonBlocks, designRecord, documentHtml, type RecordData } from '../../core/report'
import type { Section } from '../../core/run'
import { PROGRAM } from '../program'

/** Whether a run of these sections has more to tell than its water and the rows of a sweep. */
export function makesRecord(sections: readonly Section[]): boolean {
  return sections.some((section) => section !== 'water' && section !== 'sweep')
}

/** @param date as it is printed; the paper is that of the printer */
export function recordText(plan: Plan, data: RecordData, inputHash: string, date: string): string {
  const record = designRecord(plan, data, { date, program: PROGRAM, inputHash })
  const { readings = null } = data
  const compared = readings === null ? [] : comparisonBlocks(plan, readings, data.pulse)
  return documentHtml({ ...record, blocks: [...record.blocks, ...compared] }, null)
}
