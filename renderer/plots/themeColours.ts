/**
 * Colours of canvases: read from the page's CSS variables, so that theme, forced colours and a user's own style all reach them.
 */
import { onBeforeUnmount, onMounted, shallowRef, type ShallowRef } from 'vue'
import { drawingColours, type DrawingColours } from '../../core/report'

/** The page's variables behind each colour; the nozzle's is the drawing's own and may be absent. */
const VARIABLES: Readonly<Record<keyof DrawingColours, string>> = {
  ground: '--sheet',
  rule: '--rule',
  edge: '--edge',
  ink: '--ink',
  muted: '--muted',
  accent: '--accent',
  limit: '--limit',
  nozzle: '--nozzle',
}
const NAMES: readonly (keyof DrawingColours)[] = ['ground', 'rule', 'edge', 'ink', 'muted', 'accent', 'limit', 'nozzle']

/** Colours as the page shows them now, as `rgb(...)` text; what a variable does not give comes from the light or dark table. */
export function readThemeColours(root: HTMLElement): DrawingColours {
  const styles = getComputedStyle(root)
  const probe = document.createElement('span')
  probe.style.display = 'none'
  root.append(probe)
  const read = (variable: string): string | null => {
    if (styles.getPropertyValue(variable).trim() === '') return null
    // Through a real property, so that system colour names and nested variables come out as rgb.
    probe.style.color = `var(${variable})`
    return getComputedStyle(probe).color || null
  }
  const ground = read(VARIABLES.ground)
  const fallback = drawingColours(ground !== null && luminance(ground) < 0.2 ? 'dark' : 'light')
  const colours = { ...fallback }
  for (const name of NAMES) colours[name] = read(VARIABLES[name]) ?? fallback[name]
  probe.remove()
  return colours
}

/** Red, green and blue from 0 to 1 of `rgb(...)` or `#rrggbb`; black for anything else. */
export function colourParts(colour: string): readonly [number, number, number] {
  const hex = /^#([0-9a-f]{6})$/i.exec(colour.trim())?.[1]
  if (hex !== undefined) {
    const value = Number.parseInt(hex, 16)
    return [((value >> 16) & 255) / 255, ((value >> 8) & 255) / 255, (value & 255) / 255]
  }
  const [red = 0, green = 0, blue = 0] = (colour.match(/[\d.]+/g) ?? []).slice(0, 3).map(Number)
  return [red / 255, green / 255, blue / 255]
}

/** The colour with an opacity, for canvases. */
export function withOpacity(colour: string, opacity: number): string {
  const [red, green, blue] = colourParts(colour).map((part) => Math.round(part * 255))
  return `rgba(${red}, ${green}, ${blue}, ${opacity})`
}

/** Relative luminance after WCAG 2. */
function luminance(colour: string): number {
  const [red, green, blue] = colourParts(colour).map((part) =>
    part <= 0.03928 ? part / 12.92 : ((part + 0.055) / 1.055) ** 2.4,
  )
  return 0.2126 * (red ?? 0) + 0.7152 * (green ?? 0) + 0.0722 * (blue ?? 0)
}

/** Live colours: read anew when the root's theme or the system's contrast or colour scheme changes. */
export function useThemeColours(): Readonly<ShallowRef<DrawingColours>> {
  const colours = shallowRef<DrawingColours>(drawingColours('light'))
  const refresh = (): void => {
    colours.value = readThemeColours(document.documentElement)
  }
  let observer: MutationObserver | null = null
  const queries: MediaQueryList[] = []
  onMounted(() => {
    refresh()
    observer = new MutationObserver(refresh)
    observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme', 'class', 'style'] })
    for (const query of ['(prefers-color-scheme: dark)', '(forced-colors: active)', '(prefers-contrast: more)']) {
      const list = window.matchMedia(query)
      list.addEventListener('change', refresh)
      queries.push(list)
    }
  })
  onBeforeUnmount(() => {
    observer?.disconnect()
    for (const list of queries) list.removeEventListener('change', refresh)
  })
  return colours
}
