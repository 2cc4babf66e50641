/** An example as a plan file's text, and what several of them share. */
import { PLAN_FORMAT, PLAN_VERSION } from './types'

export interface Example {
  readonly id: string
  readonly title: string
  /** What it is for, in one line. */
  readonly purpose: string
  /** The plan file's text. */
  readonly text: string
}

export function example(
  id: string,
  purpose: string,
  document: { readonly title: string; readonly [key: string]: unknown },
): Example {
  const text = `${JSON.stringify({ format: PLAN_FORMAT, version: PLAN_VERSION, ...document }, null, 2)}\n`
  return { id, title: document.title, purpose, text }
}

export const NO_FLOW = { axialFlow: 0 }
export const FRESH = { kind: 'fresh', temperatureCelsius: 20, depth: 0.3 }
