/** Core names fields by their path in the plan; the window calls them what stands beside them. */
import { fieldDefinition, FIELDS, type FieldPath } from '../../core/plan'

const CHOICE_NAMES: Readonly<Record<string, string>> = {
  'water.kind': 'the kind of water',
  'nozzle.shape': 'the exit shape',
  'nozzle.exitProfile': 'the exit profile',
  'programme.shape': 'the speed programme',
}

function isFieldPath(path: string): path is FieldPath {
  return path in FIELDS
}

/** A sentence of the core with every path replaced by the field's name; the first letter stays a capital. */
export function problemInWords(message: string): string {
  return message.replace(/\b(?:water|nozzle|programme|ambient|models)\.\w+/gu, (path, offset: number) => {
    if (!isFieldPath(path)) return CHOICE_NAMES[path] ?? path
    const { label } = fieldDefinition(path)
    return offset === 0 ? label : label.toLowerCase()
  })
}
