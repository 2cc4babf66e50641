/**
 * The icon files that are committed: the containers hold what their formats say, and are the drawing as it is now.
 */
import { readFileSync } from 'node:fs'
import path from 'node:path'
import { chromium, type Browser } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import {
  drawIcons,
  ICNS_ENTRIES,
  ICO_SIZES,
  icnsFile,
  icoFile,
  ICON_FLAGS,
  LINUX_SIZES,
  type Rasters,
} from '../../build/scripts/iconFiles.mjs'
import { findChromium } from '../../build/scripts/chromium.mjs'
import { inProject } from '../../build/scripts/root.mjs'
import { describeInChromium } from '../support/chromium'

const FOLDER = inProject('build', 'icons')
const ICO = readFileSync(path.join(FOLDER, 'icon.ico'))
const ICNS = readFileSync(path.join(FOLDER, 'icon.icns'))

/** Width and height in the header of a PNG: ISO/IEC 15948, 11.2.2. */
function pixelsOf(png: Buffer): number {
  expect(png.subarray(0, 8).toString('latin1')).toBe('\x89PNG\r\n\x1a\n')
  const [width, height] = [png.readUInt32BE(16), png.readUInt32BE(20)]
  expect(height).toBe(width)
  return width
}

/** Pictures of an icns file by the type of their entry. */
function icnsEntries(file: Buffer): ReadonlyMap<string, Buffer> {
  expect(file.subarray(0, 4).toString()).toBe('icns')
  expect(file.readUInt32BE(4)).toBe(file.byteLength)
  const entries = new Map<string, Buffer>()
  for (let at = 8; at < file.byteLength; at += file.readUInt32BE(at + 4))
    entries.set(file.subarray(at, at + 4).toString(), file.subarray(at + 8, at + file.readUInt32BE(at + 4)))
  return entries
}

/** Pictures of an ico file with the width its directory gives them. */
function icoEntries(file: Buffer): readonly { readonly width: number; readonly picture: Buffer }[] {
  expect([file.readUInt16LE(0), file.readUInt16LE(2)]).toEqual([0, 1])
  return Array.from({ length: file.readUInt16LE(4) }, (_, index) => {
    const entry = 6 + 16 * index
    const from = file.readUInt32LE(entry + 12)
    return {
      width: file.readUInt8(entry) || 256,
      picture: file.subarray(from, from + file.readUInt32LE(entry + 8)),
    }
  })
}

describe('the icon files', () => {
  it('hold a picture of each size they announce', () => {
    for (const { width, picture } of icoEntries(ICO)) expect(pixelsOf(picture)).toBe(width)
    expect(icoEntries(ICO).map(({ width }) => width)).toEqual(ICO_SIZES)
    const entries = [...icnsEntries(ICNS)].map(([type, picture]) => [type, pixelsOf(picture)])
    expect(Object.fromEntries(entries)).toEqual(ICNS_ENTRIES)
    for (const pixels of LINUX_SIZES)
      expect(pixelsOf(readFileSync(path.join(FOLDER, 'linux', `${pixels}x${pixels}.png`)))).toBe(pixels)
  })

  it('are light: under half a megabyte together', () => {
    const linux = LINUX_SIZES.map((pixels) => readFileSync(path.join(FOLDER, 'linux', `${pixels}x${pixels}.png`)))
    expect([ICO, ICNS, ...linux].reduce((sum, file) => sum + file.byteLength, 0)).toBeLessThan(500_000)
  })
})

describeInChromium('the icon files, drawn again', () => {
  let browser: Browser
  let rasters: Rasters
  beforeAll(async () => {
    browser = await chromium.launch({ executablePath: findChromium() ?? '', args: ICON_FLAGS })
    rasters = await drawIcons(browser)
  }, 60_000)
  afterAll(() => browser.close())

  /** Mean difference of two pictures over all pixels and channels, of 255. */
  async function difference(one: Buffer, other: Buffer): Promise<number> {
    const page = await browser.newPage()
    try {
      const sources = [one, other].map((png) => `data:image/png;base64,${png.toString('base64')}`)
      return await page.evaluate(async (pair) => {
        const levels = pair.map(async (source) => {
          const image = new Image()
          image.src = source
          await image.decode()
          const canvas = document.createElement('canvas')
          canvas.width = canvas.height = image.width
          const context = canvas.getContext('2d')
          context?.drawImage(image, 0, 0)
          return context?.getImageData(0, 0, image.width, image.width).data ?? new Uint8ClampedArray()
        })
        const [a = new Uint8ClampedArray(), b = new Uint8ClampedArray()] = await Promise.all(levels)
        if (a.length === 0 || a.length !== b.length) return 255
        return a.reduce((sum, level, index) => sum + Math.abs(level - (b[index] ?? 0)), 0) / a.length
      }, sources)
    } finally {
      await page.close()
    }
  }

  it('show the drawing as it is now: run build/generate-icons.mjs after changing it', async () => {
    // Releases of Chromium smooth edges differently: a level or so in the mean. Another drawing differs by tens.
    const now = icoEntries(icoFile(rasters.square))
    for (const [index, { width, picture }] of icoEntries(ICO).entries()) {
      const again = now[index]?.picture ?? Buffer.alloc(0)
      expect(await difference(picture, again), `${width} pixels`).toBeLessThan(3)
    }
    const committed = icnsEntries(ICNS).get('ic08') ?? Buffer.alloc(0)
    const drawn = icnsEntries(icnsFile(rasters.mac)).get('ic08') ?? Buffer.alloc(0)
    expect(await difference(committed, drawn)).toBeLessThan(3)
    expect(await difference(committed, now.at(-1)?.picture ?? Buffer.alloc(0))).toBeGreaterThan(10)
  })
})
