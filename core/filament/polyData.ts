/**
 * Rings at one time as a PolyData file: closed polylines with the numbers of their ring.
 *
 * Format: the published XML format of the Visualization Toolkit (VTK XML, PolyData, version 0.1, ASCII), lengths in metres.
 */
import type { RingShape } from './wakeFrame'

function dataArray(type: string, name: string, components: number, values: readonly string[]): string {
  const shape = components === 1 ? '' : ` NumberOfComponents="${components}"`
  return `<DataArray type="${type}" Name="${name}"${shape} format="ascii">\n${values.join(' ')}\n</DataArray>`
}

const CELL_COLUMNS = [
  ['circulation', (ring: RingShape) => ring.circulation],
  ['radius', (ring: RingShape) => ring.radius],
  ['coreRadius', (ring: RingShape) => ring.coreRadius],
  ['speed', (ring: RingShape) => ring.speed],
] as const

/**
 * Text of a .vtp file.
 *
 * @param rings as `wakeFrame` gives them; none is an empty file
 * @param time [s], kept as TimeValue
 */
export function wakePolyData(rings: readonly RingShape[], time: number): string {
  const points: string[] = []
  const connectivity: string[] = []
  const offsets: string[] = []
  let first = 0
  for (const { nodes } of rings) {
    const count = nodes.length / 3
    for (const value of nodes) points.push(String(value))
    for (let k = 0; k <= count; k++) connectivity.push(String(first + (k % count)))
    first += count
    offsets.push(String(connectivity.length))
  }
  const cells = CELL_COLUMNS.map(([name, of]) =>
    dataArray(
      'Float64',
      name,
      1,
      rings.map((ring) => String(of(ring))),
    ),
  )
  return [
    '<?xml version="1.0"?>',
    '<VTKFile type="PolyData" version="0.1" byte_order="LittleEndian">',
    '<PolyData>',
    '<FieldData>',
    `<DataArray type="Float64" Name="TimeValue" NumberOfTuples="1" format="ascii">\n${time}\n</DataArray>`,
    '</FieldData>',
    `<Piece NumberOfPoints="${first}" NumberOfVerts="0" NumberOfLines="${rings.length}" NumberOfStrips="0" NumberOfPolys="0">`,
    '<Points>',
    dataArray('Float64', 'Points', 3, points),
    '</Points>',
    '<Lines>',
    dataArray('Int64', 'connectivity', 1, connectivity),
    dataArray('Int64', 'offsets', 1, offsets),
    '</Lines>',
    '<CellData>',
    dataArray(
      'Int32',
      'ring',
      1,
      rings.map((ring) => String(ring.number)),
    ),
    ...cells,
    '</CellData>',
    '</Piece>',
    '</PolyData>',
    '</VTKFile>',
    '',
  ].join('\n')
}
