/**
 * The headless runner as a process: its streams, its caller's folder, its interrupt.
 */
import type { EventEmitter } from 'node:events'
import { addAbortSignal } from 'node:stream'
import { systemCode } from './files/fileSentence'
import { MAXIMUM_FILE_BYTES } from './limits'
import { runBatch, type ExitCode } from './batch/runBatch'

/**
 * Run with the process's own streams.
 *
 * @param list arguments after the program
 * @returns exit code: 0 done, 2 refused, 1 failed, 130 interrupted
 */
export async function main(list: readonly string[]): Promise<ExitCode> {
  const controller = new AbortController()
  const interrupt = (): void => controller.abort()
  for (const stream of [process.stdout, process.stderr]) outliveReader(stream)
  process.once('SIGINT', interrupt)
  process.once('SIGTERM', interrupt)
  try {
    return await runBatch(list, {
      // npm starts scripts in the project's folder and tells where the caller stood.
      folder: process.env['INIT_CWD'] ?? process.cwd(),
      signal: controller.signal,
      date: new Date().toISOString().slice(0, 10),
      pause: () => new Promise((resolve) => setImmediate(resolve)),
      readStandardInput: () => readStandardInput(controller.signal),
      writtenLine: (text) => console.log(text),
      note: (text) => console.error(text),
    })
  } finally {
    process.off('SIGINT', interrupt)
    process.off('SIGTERM', interrupt)
  }
}

const outlived = new WeakSet<EventEmitter>()

/** Where whoever reads a stream has gone, nobody listens: the run goes on and writes its files. Other failures are thrown as ever. */
export function outliveReader(stream: EventEmitter): void {
  if (outlived.has(stream)) return
  outlived.add(stream)
  stream.on('error', (error: unknown) => {
    if (systemCode(error) !== 'EPIPE') throw error
  })
}

/** All of standard input, or just more than a plan may have: what reads it refuses that. An interrupt ends the wait. */
async function readStandardInput(signal: AbortSignal): Promise<Uint8Array> {
  const chunks: Buffer[] = []
  let size = 0
  for await (const chunk of addAbortSignal(signal, process.stdin)) {
    const bytes = Buffer.from(chunk)
    chunks.push(bytes)
    size += bytes.byteLength
    if (size > MAXIMUM_FILE_BYTES) break
  }
  return Buffer.concat(chunks)
}
