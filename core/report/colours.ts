/**
 * Colours of drawings that leave the window. Light and dark match the window; print is for white paper and survives in grey.
 */

export type DrawingTheme = 'light' | 'dark' | 'print'

export interface DrawingColours {
  readonly ground: string
  readonly rule: string
  readonly edge: string
  readonly ink: string
  readonly muted: string
  readonly accent: string
  /** Kept for limits; no series wears it. */
  readonly limit: string
  readonly nozzle: string
}

const COLOURS: Readonly<Record<DrawingTheme, DrawingColours>> = {
  light: {
    ground: '#FFFFFF',
    rule: '#D9D6CC',
    edge: '#8A8674',
    ink: '#1B2430',
    muted: '#5A6472',
    accent: '#0A5F78',
    limit: '#B23A0E',
    nozzle: '#C9C2B0',
  },
  dark: {
    ground: '#1A2129',
    rule: '#2E3842',
    edge: '#6E7B88',
    ink: '#E8ECEF',
    muted: '#9BA8B5',
    accent: '#5CC3DE',
    limit: '#FF9A6B',
    nozzle: '#76818C',
  },
  print: {
    ground: '#FFFFFF',
    rule: '#C8C8C8',
    edge: '#777777',
    ink: '#000000',
    muted: '#444444',
    accent: '#0A5F78',
    limit: '#8F2E0B',
    nozzle: '#CFCFCF',
  },
}

export function drawingColours(theme: DrawingTheme): DrawingColours {
  return COLOURS[theme]
}
