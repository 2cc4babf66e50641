/** An example as a plan file's text, and what several of them share. */
import { PLAN_FORMAT, PLAN_VERSION } from './types'

/** What an example is about: the page of the window it is shown on. */
export type ExamplePage = 'stroke' | 'thrust' | 'wake' | 'tankRun' | 'readings'

export interface Example {
  readonly id: string
  readonly title: string
  /** What it is for, in one line. */
  readonly purpose: string
  readonly page: ExamplePage
  /** The plan file's text. */
  readonly text: string
}

export function example(
  id: string,
  purpose: string,
  document: { readonly title: string; readonly [key: string]: unknown },
): Example {
  const text = `${JSON.stringify({ format: PLAN_FORMAT, version: PLAN_VERSION, ...document }, null, 2)}\n`
  return { id, title: document.title, purpose, page: pageOf(document), text }
}

/** Sections from the last thing done with a plan to the first: the last one there is what the example is about. */
const PAGES = [
  ['readings', 'readings'],
  ['tankRun', 'tankRun'],
  ['thruster', 'thrust'],
  ['wake', 'wake'],
] as const

function pageOf(document: { readonly [key: string]: unknown }): ExamplePage {
  return PAGES.find(([section]) => section in document)?.[1] ?? 'stroke'
}

export const NO_FLOW = { axialFlow: 0 }
export const FRESH = { kind: 'fresh', temperatureCelsius: 20, depth: 0.3 }
