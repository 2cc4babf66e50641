/**
 * Draws the icon files of the packages from build/icons/ringwright.svg and renderer/icon.svg in an installed Chromium. What it
 * makes is committed, so that packaging needs no Chromium; a test draws them again and compares.
 */
import { mkdirSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { chromium } from 'playwright-core'
import { findChromium } from './scripts/chromium.mjs'
import { drawIcons, icnsFile, ICON_FLAGS, icoFile, LINUX_SIZES } from './scripts/iconFiles.mjs'
import { inProject, tell } from './scripts/root.mjs'

const executablePath = findChromium()
if (executablePath === null) {
  tell('The icons are drawn by Chromium, and none was found.')
  process.exit(1)
}
const browser = await chromium.launch({ executablePath, args: ICON_FLAGS })
try {
  const { square, mac } = await drawIcons(browser)
  const folder = inProject('build', 'icons')
  mkdirSync(path.join(folder, 'linux'), { recursive: true })
  for (const pixels of LINUX_SIZES)
    writeFileSync(path.join(folder, 'linux', `${pixels}x${pixels}.png`), square.get(pixels) ?? '')
  writeFileSync(path.join(folder, 'icon.ico'), icoFile(square))
  writeFileSync(path.join(folder, 'icon.icns'), icnsFile(mac))
} finally {
  await browser.close()
}
