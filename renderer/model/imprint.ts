/** Pictures that leave the window bear the plan's title and the program: one place, whichever page they come from. */
import { imprintSvg } from '../../core/report'
import type { Host } from '../host/types'
import { imprintPng } from '../plots/imprintPng'
import { PROGRAM } from './program'

/** `Bench ring generator, Ringwright 0.1.0`; no date, so that the same plan gives the same file. */
export function imprintLine(title: string): string {
  return title.trim() === '' ? PROGRAM : `${title.trim()}, ${PROGRAM}`
}

/** The host with pictures imprinted before they are written. @param title of the open plan */
export function withImprint(host: Host, title: () => string): Host {
  return {
    ...host,
    async exportFile(kind, name, content) {
      try {
        return await host.exportFile(kind, name, await imprinted(kind, content, imprintLine(title())))
      } catch (problem) {
        const why = problem instanceof Error ? problem.message : 'for a reason that is not known'
        return { failure: `${name} was not written: ${why}` }
      }
    },
  }
}

async function imprinted(kind: string, content: string | Uint8Array, line: string): Promise<string | Uint8Array> {
  if (kind === 'svg' && typeof content === 'string') return imprintSvg(content, line)
  if (kind === 'png' && content instanceof Uint8Array) return imprintPng(content, line)
  return content
}
