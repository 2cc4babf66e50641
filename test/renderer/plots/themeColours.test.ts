import { afterEach, describe, expect, it } from 'vitest'
import { colourParts, readThemeColours, withOpacity } from '../../../renderer/plots/themeColours'

afterEach(() => document.documentElement.removeAttribute('style'))

describe('colours of canvases', () => {
  it('come from the page where it gives them', () => {
    document.documentElement.style.setProperty('--accent', '#123456')
    expect(colourParts(readThemeColours(document.documentElement).accent)).toEqual(colourParts('#123456'))
  })

  it('fall back to the light drawing where the page gives none', () => {
    expect(readThemeColours(document.documentElement).ink).toBe('#1B2430')
  })

  it('leave nothing behind on the page', () => {
    const before = document.documentElement.children.length
    readThemeColours(document.documentElement)
    expect(document.documentElement.children.length).toBe(before)
  })

  it('are read as hexadecimal and as rgb', () => {
    expect(colourParts('#ff0080')).toEqual([1, 0, 128 / 255])
    expect(colourParts('rgb(255, 0, 51)')).toEqual([1, 0, 0.2])
    expect(withOpacity('#0A5F78', 0.15)).toBe('rgba(10, 95, 120, 0.15)')
  })
})
