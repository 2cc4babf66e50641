/** Colours of the drawing of rings: those of the page, and the one of rings that turn the other way. */
import { counterColour, type DrawingColours } from '../../../core/report'
import { isDark } from '../drawing'

export interface WakeColours extends DrawingColours {
  readonly counter: string
}

export function wakeColours(colours: DrawingColours): WakeColours {
  return { ...colours, counter: counterColour(isDark(colours)) }
}

export function senseColour(sense: 1 | -1): 'accent' | 'counter' {
  return sense > 0 ? 'accent' : 'counter'
}
