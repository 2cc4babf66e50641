import { beforeAll, describe, expect, it } from 'vitest'
import { drawingColours, tankSceneToSvg, textWidth, type TankExtentName } from '../../../core/report'
import { expectClose } from '../../support/close'
import { CASES, tankCase, type TankCase } from './tankRuns'
import { readXml, textsOf, type WrittenText } from './xml'

const SIZES = [
  [830, 420],
  [700, 330],
  [460, 300],
  [1330, 620],
  [320, 260],
] as const
const PARTS: readonly TankExtentName[] = ['whole', 'path']

interface Box {
  readonly text: string
  readonly left: number
  readonly top: number
  readonly right: number
  readonly bottom: number
}

/** Where a word stands; 2 pixels are let go all around, for the room that letters leave in their box. */
function boxOf({ text, x, y, size, anchor, turned }: WrittenText): Box {
  const length = textWidth(text, size)
  if (turned) return { text, left: x - size + 3, right: x + 1, bottom: y - 2, top: y - length + 2 }
  const left = anchor === 'middle' ? x - length / 2 : x
  return { text, left: left + 2, right: left + length - 2, top: y - size + 3, bottom: y }
}

function collide(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom
}

describe.each(Object.entries(CASES))('the drawing of %s', (_name, change) => {
  let made: TankCase
  beforeAll(async () => {
    made = await tankCase(change)
  })

  function written(width: number, height: number, part: TankExtentName): string {
    return tankSceneToSvg(made.scene, { width, height, part, colours: drawingColours('light'), id: 'tank' })
  }

  it.each(SIZES.flatMap(([w, h]) => PARTS.map((part) => [w, h, part] as const)))(
    'keeps its words apart and inside at %i x %i, %s',
    (width, height, part) => {
      const boxes = textsOf(readXml(written(width, height, part))).map(boxOf)
      expect(boxes.length).toBeGreaterThan(2)
      for (const [i, a] of boxes.entries()) {
        expect(a.left >= -1 && a.right <= width + 1, `${a.text} leaves the drawing`).toBe(true)
        for (const b of boxes.slice(i + 1)) expect(collide(a, b), `"${a.text}" stands on "${b.text}"`).toBe(false)
      }
    },
  )

  it('is well formed, named, described, of finite numbers and without a style of its own', () => {
    for (const part of PARTS) {
      const svg = written(830, 420, part)
      const root = readXml(svg)
      expect(root.children.find(({ name }) => name === 'title')?.text).toBe('Tank, ring and camera to scale')
      expect(root.children.find(({ name }) => name === 'desc')?.text).toMatch(/^Drawing to scale/)
      expect(svg).not.toMatch(/NaN|Infinity|undefined/)
      // The page's policy allows no style attribute.
      expect(svg).not.toContain('style=')
    }
  })
})

describe('the drawing of a tank', () => {
  it('is to one scale: circles of the cores, the field and the tank measure as the numbers say', async () => {
    const { scene, result } = await tankCase()
    const svg = tankSceneToSvg(scene, {
      width: 830,
      height: 420,
      part: 'whole',
      colours: drawingColours('light'),
      id: 'a',
    })
    const circles = [...svg.matchAll(/<circle cx="([\d.]+)" cy="([\d.]+)" r="([\d.]+)"/g)].map((match) =>
      match.slice(1).map(Number),
    )
    // Two views, three stations, two cuts through each core.
    expect(circles).toHaveLength(12)
    const [first = [], below = [], ,] = circles
    const dashed = /<rect x="([\d.]+)" y="([\d.]+)" width="([\d.]+)" height="([\d.]+)"[^>]*stroke-dasharray="7 3"/.exec(
      svg,
    )
    const [along = 0, high = 0] = result.imaging.fieldOfView ?? []
    const scale = Number(dashed?.[3]) / along
    // Written to a hundredth of a pixel, of a field about 90 pixels wide.
    expectClose(Number(dashed?.[4]) / scale, high, 1e-3, 'height of the field')
    expectClose(
      Math.abs((first[1] ?? 0) - (below[1] ?? 0)) / scale,
      2 * (result.arrivals[0]?.radius ?? 0),
      2e-3,
      'ring',
    )
    expectClose(((circles[4]?.[0] ?? 0) - (first[0] ?? 0)) / scale, 0.2, 1e-3, 'from the first station to the third')
  })

  it('tells each station with its range, and where the ring is not seen that it is not', async () => {
    const { scene } = await tankCase({ tank: { length: 0.25, width: 0.4, depth: 0.5, bore: null } })
    expect(scene.stations.map(({ labels }) => labels[0])).toEqual([
      expect.stringMatching(/^100\u00a0mm: [\d.]+ to [\d.]+ s$/),
      expect.stringMatching(/^200\u00a0mm: [\d.]+ to [\d.]+ s$/),
      '300\u00a0mm: not seen',
    ])
    expect(scene.stations[2]?.ring).toBeNull()
  })

  it('draws a wall nearer than practice in the colour of limits and says what practice asks for', async () => {
    const near = await tankCase(CASES['a tight tank with many stations'])
    const warned = near.scene.views.flatMap(({ clearances }) => clearances.filter(({ warn }) => warn))
    expect(warned.map(({ label }) => label)).toContain('4 D of 8 D, 0.1\u00a0m')
    const colours = drawingColours('light')
    const drawn = tankSceneToSvg(near.scene, { width: 830, height: 420, part: 'whole', colours, id: 'a' })
    expect(drawn).toContain(`stroke="${colours.limit}"`)
    const far = await tankCase()
    expect(far.scene.views.every(({ clearances }) => clearances.every(({ warn }) => !warn))).toBe(true)
  })

  it('holds the spread of places between the slowest and the fastest ring of the range', async () => {
    const { scene, result } = await tankCase()
    const time = result.arrivals[1]?.time ?? 0
    const [low = 0, high = 0] = scene.stations[1]?.spread ?? []
    expect(low).toBeLessThan(0.2)
    expect(high).toBeGreaterThan(0.2)
    const after = result.path?.time.findIndex((value) => value > time) ?? 0
    expect(low).toBeGreaterThan(result.path?.xLow[after - 1] ?? 0)
    expect(high).toBeLessThan(result.path?.xHigh[after] ?? 0)
  })
})
