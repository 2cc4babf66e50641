/**
 * Quantities at the edge of the program: units in and out of text; inside, plain SI numbers.
 */
export { describeDimension, dimensionNoun, type Dimension } from './dimensions'
export { formatFixed, formatFull, formatNumber, formatQuantity, formatRange } from './format'
export { parseQuantity, type ParsedQuantity, type ParseOptions } from './parse'
export { stepQuantity } from './step'
export { siUnit, defaultUnit, DIMENSIONS, fromBase, toBase, unitOf, unitsOf, type UnitDefinition } from './units'
