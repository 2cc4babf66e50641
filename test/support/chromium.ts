/**
 * Real Chromium for the browser tests. Where none is found those tests are skipped and counted as skipped, never as passed.
 */
import { chromium, type Browser } from 'playwright-core'
import { describe } from 'vitest'
import { findChromium } from '../../build/scripts/chromium.mjs'

/** Software WebGL, no network of its own, no first-run pages. */
export const CHROMIUM_FLAGS = [
  '--no-sandbox',
  '--use-angle=swiftshader',
  '--enable-unsafe-swiftshader',
  '--ignore-gpu-blocklist',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

const executablePath = findChromium()

/** A group of tests that need Chromium: skipped where there is none. */
export const describeInChromium = describe.skipIf(executablePath === null)

/** Start Chromium. Close it in `afterAll`. @throws when none is installed */
export async function launchChromium(): Promise<Browser> {
  if (executablePath === null) throw new Error('No Chromium is installed: these tests should have been skipped.')
  return chromium.launch({ executablePath, args: CHROMIUM_FLAGS })
}
