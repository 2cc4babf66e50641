/** The program's icon as the files each system wants: sizes, drawing them, and the two containers, whose entries are PNG. */
import { readFileSync } from 'node:fs'
import { inProject } from './root.mjs'

/** The mark, and the same mark drawn for few pixels; the second is the page's own icon. */
const MARK = inProject('build', 'icons', 'ringwright.svg')
const SMALL_MARK = inProject('renderer', 'icon.svg')

/** Drawn without a graphics card, whose edges differ from one to the next. */
export const ICON_FLAGS = ['--no-sandbox', '--disable-gpu']

/** Below this many pixels the small drawing is used. */
const SMALL = 48

export const LINUX_SIZES = /** @type {const} */ ([16, 24, 32, 48, 64, 128, 256, 512])
export const ICO_SIZES = /** @type {const} */ ([16, 24, 32, 48, 64, 128, 256])

/** Entries of an icns file and their pixels; those of one number of pixels are the plain size and the doubled half. */
export const ICNS_ENTRIES = /** @type {const} */ ({
  icp4: 16,
  icp5: 32,
  ic11: 32,
  ic12: 64,
  ic07: 128,
  ic08: 256,
  ic13: 256,
  ic09: 512,
  ic14: 512,
  ic10: 1024,
})

/** macOS leaves a margin round an icon, of this part of its width; elsewhere icons fill their square. */
const MAC_MARGIN = 0.0977

/**
 * @typedef {object} Rasters
 * @property {ReadonlyMap<number, Buffer>} square PNG by pixels, filling the square
 * @property {ReadonlyMap<number, Buffer>} mac PNG by pixels, with the margin of macOS
 */

/** @param {import('playwright-core').Browser} browser @returns {Promise<Rasters>} */
export async function drawIcons(browser) {
  const page = await browser.newPage({ deviceScaleFactor: 1 })
  /** @param {number} pixels @param {number} margin part of the width */
  const draw = async (pixels, margin) => {
    const mark = readFileSync(pixels < SMALL ? SMALL_MARK : MARK).toString('base64')
    const side = pixels < SMALL ? pixels : pixels * (1 - 2 * margin)
    const place = `position:absolute;left:${(pixels - side) / 2}px;top:${(pixels - side) / 2}px`
    await page.setViewportSize({ width: pixels, height: pixels })
    await page.setContent(
      `<body style="margin:0"><img src="data:image/svg+xml;base64,${mark}" width="${side}" height="${side}" style="${place}">`,
    )
    // As text, since the types of a page are not those of this room.
    await page.evaluate('Promise.all([...document.images].map((image) => image.decode()))')
    return page.screenshot({ omitBackground: true, type: 'png' })
  }
  const square = new Map()
  for (const pixels of new Set([...LINUX_SIZES, ...ICO_SIZES])) square.set(pixels, await draw(pixels, 0))
  const mac = new Map()
  for (const pixels of new Set(Object.values(ICNS_ENTRIES))) mac.set(pixels, await draw(pixels, MAC_MARGIN))
  await page.close()
  return { square, mac }
}

/** A Windows icon file. @param {ReadonlyMap<number, Buffer>} pictures PNG by pixels @returns {Buffer} */
export function icoFile(pictures) {
  const header = Buffer.alloc(6 + 16 * ICO_SIZES.length)
  header.writeUInt16LE(1, 2)
  header.writeUInt16LE(ICO_SIZES.length, 4)
  let offset = header.byteLength
  const parts = ICO_SIZES.map((pixels, index) => {
    const picture = pictureOf(pictures, pixels)
    const entry = 6 + 16 * index
    // A byte each for width and height, in which 0 stands for 256.
    header.writeUInt8(pixels % 256, entry)
    header.writeUInt8(pixels % 256, entry + 1)
    header.writeUInt16LE(1, entry + 4)
    header.writeUInt16LE(32, entry + 6)
    header.writeUInt32LE(picture.byteLength, entry + 8)
    header.writeUInt32LE(offset, entry + 12)
    offset += picture.byteLength
    return picture
  })
  return Buffer.concat([header, ...parts])
}

/** A macOS icon file. @param {ReadonlyMap<number, Buffer>} pictures PNG by pixels @returns {Buffer} */
export function icnsFile(pictures) {
  const entries = Object.entries(ICNS_ENTRIES).map(([type, pixels]) => block(type, pictureOf(pictures, pixels)))
  return block('icns', Buffer.concat(entries))
}

/** Four letters, the length of the whole, what it holds. @param {string} type @param {Buffer} content */
function block(type, content) {
  const head = Buffer.alloc(8)
  head.write(type, 0, 'latin1')
  head.writeUInt32BE(8 + content.byteLength, 4)
  return Buffer.concat([head, content])
}

/** @param {ReadonlyMap<number, Buffer>} pictures @param {number} pixels */
function pictureOf(pictures, pixels) {
  const picture = pictures.get(pixels)
  if (picture === undefined) throw new Error(`There is no picture of ${pixels} pixels.`)
  return picture
}
