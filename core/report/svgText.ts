/**
 * Small pieces every SVG of ours is written with.
 */

/** Text made safe for element content and quoted attributes; characters XML forbids are dropped. */
export function escapeXml(text: string): string {
  return text
    .replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/g, '')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;')
    .replace(/'/g, '&#39;')
}

/** A coordinate to a hundredth of a pixel, without trailing zeros. */
export function coordinate(value: number): string {
  return String(Math.round(value * 100) / 100 + 0)
}

/** `M x y L x y ...` through points; empty for none. */
export function pathThrough(points: readonly { readonly x: number; readonly y: number }[]): string {
  return points
    .map((point, index) => `${index === 0 ? 'M' : 'L'}${coordinate(point.x)} ${coordinate(point.y)}`)
    .join('')
}

export const FONT_FAMILY = "system-ui, -apple-system, 'Segoe UI', Roboto, 'Helvetica Neue', Arial, sans-serif"

export interface TextStyle {
  readonly size: number
  readonly colour: string
  readonly anchor?: 'start' | 'middle' | 'end'
  readonly weight?: number
  /** Turned a quarter to the left about its own point. */
  readonly vertical?: boolean
  /** Colour of a thin halo that keeps the words readable on lines. */
  readonly halo?: string
}

/** A `<text>` element with its baseline at (x, y). */
export function svgText(text: string, x: number, y: number, style: TextStyle): string {
  const parts = [`x="${coordinate(x)}" y="${coordinate(y)}" font-size="${style.size}" fill="${style.colour}"`]
  if (style.anchor !== undefined && style.anchor !== 'start') parts.push(`text-anchor="${style.anchor}"`)
  if (style.weight !== undefined) parts.push(`font-weight="${style.weight}"`)
  if (style.vertical === true) parts.push(`transform="rotate(-90 ${coordinate(x)} ${coordinate(y)})"`)
  if (style.halo !== undefined)
    parts.push(`stroke="${style.halo}" stroke-width="3" stroke-linejoin="round" paint-order="stroke"`)
  return `<text ${parts.join(' ')}>${escapeXml(text)}</text>`
}
