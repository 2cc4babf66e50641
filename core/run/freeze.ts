/** Freeze a result and all it holds, so that no page can change a number on its way to another. */
export function freezeDeep<T>(value: T): T {
  if (typeof value !== 'object' || value === null || ArrayBuffer.isView(value) || Object.isFrozen(value)) return value
  Object.freeze(value)
  for (const child of Object.values(value)) freezeDeep(child)
  return value
}
