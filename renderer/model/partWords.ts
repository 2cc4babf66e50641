/** What a part of a list is, in a few words: the numbers it is chosen by. */
import {
  CHOICES,
  fieldDefinition,
  isFieldPath,
  LIST_KINDS,
  unitKeyOf,
  type ListEntry,
  type ListKind,
} from '../../core/plan'
import { formatQuantity } from '../../core/quantity'
import type { Units } from './units'

const TOLD: Readonly<Record<ListKind, readonly string[]>> = {
  nozzles: ['shape', 'diameter', 'pistonDiameter'],
  actuators: ['maxForce', 'maxSpeed', 'maxPower', 'maxTravel'],
  vehicles: ['mass', 'length'],
  tanks: ['length', 'width', 'depth', 'bore'],
  cameras: ['pixels', 'maxFrameRate', 'pixelPitch'],
}

export function partInWords(kind: ListKind, { values }: ListEntry, units: Units): string {
  const { path } = LIST_KINDS[kind]
  return TOLD[kind]
    .flatMap((key) => {
      const value = values[key] ?? null
      if (Array.isArray(value)) return [`${value.join(' × ')} px`]
      const field = `${path}.${key}`
      if (key === 'shape')
        return Object.entries(CHOICES['nozzle.shape']).flatMap(([name, words]) => (name === value ? [words] : []))
      if (typeof value !== 'number' || !isFieldPath(field)) return []
      const { label, dimension } = fieldDefinition(field)
      return [`${label.toLowerCase()} ${formatQuantity(value, units[unitKeyOf(field, dimension)])}`]
    })
    .join(', ')
}
