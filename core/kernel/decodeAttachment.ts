import type { Attachment } from './poolProtocol'

/** The attachment in a thread's message, or null for any other message. */
export function decodeAttachment(message: unknown): Attachment | null {
  if (typeof message !== 'object' || message === null || !('kernelAttachment' in message)) return null
  const value = message.kernelAttachment as Partial<Attachment>
  const whole = [value.targetCapacity, value.sourceCapacity, value.epoch, value.generation].every(Number.isInteger)
  if (!whole || !(value.control instanceof Int32Array) || !(value.data instanceof SharedArrayBuffer)) return null
  return value as Attachment
}
