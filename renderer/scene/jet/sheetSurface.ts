/**
 * The sheet turned about the axis: a strip of triangles for each piece of it, cut open toward the viewer, written anew in place for
 * each shape.
 */
import { BufferAttribute, BufferGeometry, DynamicDrawUsage } from 'three'
import { at } from '../../../core/base'
import { AGE_STEPS, ageColour, ageStep, type SheetLine } from '../../../core/report'
import { CUT_FROM, CUT_TO } from '../meshes'
import { linearParts } from '../ribbons'

/** Parts of the turn that is left. */
const AROUND = 36
/** Angles of the two edges of the cut, from straight up toward the viewer [rad]. */
export const EDGE_ANGLES = [CUT_FROM + 2 * Math.PI, CUT_TO] as const

export interface SheetSurface {
  readonly geometry: BufferGeometry
  /** @param brighten factor on the colours, for the light of the drawing */
  setColours(dark: boolean, brighten: number): void
  draw(line: SheetLine): void
}

export function createSheetSurface(): SheetSurface {
  const geometry = new BufferGeometry()
  const [from, to] = [CUT_TO, CUT_FROM + 2 * Math.PI]
  const cosines = new Float64Array(AROUND + 1)
  const sines = new Float64Array(AROUND + 1)
  for (let j = 0; j <= AROUND; j += 1) {
    const angle = from + ((to - from) * j) / AROUND
    cosines[j] = Math.cos(angle)
    sines[j] = Math.sin(angle)
  }
  let rows = 0
  let position = new Float32Array(0)
  let normal = new Float32Array(0)
  let colour = new Float32Array(0)
  const paints = new Float32Array(3 * AGE_STEPS)

  /** Room for so many points of the sheet, kept from then on. */
  function reserve(wanted: number): void {
    if (wanted <= rows) return
    rows = Math.ceil(wanted * 1.4)
    const vertices = rows * (AROUND + 1)
    position = new Float32Array(3 * vertices)
    normal = new Float32Array(3 * vertices)
    colour = new Float32Array(3 * vertices)
    const index = new Uint32Array((rows - 1) * AROUND * 6)
    let next = 0
    for (let i = 0; i < rows - 1; i += 1) {
      for (let j = 0; j < AROUND; j += 1) {
        const a = i * (AROUND + 1) + j
        const b = a + AROUND + 1
        index[next] = a
        index[next + 1] = b
        index[next + 2] = a + 1
        index[next + 3] = b
        index[next + 4] = b + 1
        index[next + 5] = a + 1
        next += 6
      }
    }
    geometry.dispose()
    for (const [name, array] of [
      ['position', position],
      ['normal', normal],
      ['color', colour],
    ] as const)
      geometry.setAttribute(name, new BufferAttribute(array, 3).setUsage(DynamicDrawUsage))
    geometry.setIndex(new BufferAttribute(index, 1))
  }

  return {
    geometry,
    setColours(dark, brighten) {
      for (let step = 0; step < AGE_STEPS; step += 1) {
        const parts = linearParts(ageColour(step, dark))
        for (const channel of [0, 1, 2] as const) paints[3 * step + channel] = Math.min(1, parts[channel] * brighten)
      }
    },
    draw(line) {
      reserve(line.count)
      let k = 0
      for (let i = 0; i < line.count; i += 1) {
        const [before, after] = [Math.max(0, i - 1), Math.min(line.count - 1, i + 1)]
        const tx = at(line.x, after) - at(line.x, before)
        const tr = at(line.r, after) - at(line.r, before)
        const length = Math.hypot(tx, tr) || 1
        const [nx, nr] = [-tr / length, tx / length]
        const [x, r] = [at(line.x, i), at(line.r, i)]
        const paint = 3 * ageStep(at(line.age, i))
        const [red, green, blue] = [at(paints, paint), at(paints, paint + 1), at(paints, paint + 2)]
        for (let j = 0; j <= AROUND; j += 1) {
          const [c, s] = [at(cosines, j), at(sines, j)]
          position[k] = x
          position[k + 1] = r * c
          position[k + 2] = r * s
          normal[k] = nx
          normal[k + 1] = nr * c
          normal[k + 2] = nr * s
          colour[k] = red
          colour[k + 1] = green
          colour[k + 2] = blue
          k += 3
        }
      }
      for (const name of ['position', 'normal', 'color']) {
        const attribute = geometry.getAttribute(name)
        if (!(attribute instanceof BufferAttribute)) continue
        attribute.clearUpdateRanges()
        attribute.addUpdateRange(0, k)
        attribute.needsUpdate = true
      }
      geometry.setDrawRange(0, Math.max(0, line.count - 1) * AROUND * 6)
    },
  }
}
