/** Every figure of the performance list this version can measure. */
import { commandFigures } from './commands'
import { coreFigures } from './core'
import { jetFigures } from './jet'
import { kernelBench } from './kernel'
import type { Figure } from './measure'
import { thrusterFigures } from './thruster'
import { varietyFigures } from './variety'
import { wakePlaybackFigures } from './wakePlayback'

/** Groups by name, so that one can be asked for alone: `npm run bench -- core`. */
export const GROUPS: Readonly<Record<string, () => Promise<readonly Figure[]>>> = {
  core: async () => coreFigures(),
  kernel: kernelBench,
  jet: jetFigures,
  thruster: thrusterFigures,
  variety: varietyFigures,
  playback: wakePlaybackFigures,
  commands: commandFigures,
}

export type { Figure }
