/**
 * Rules of image velocimetry, each a formula of its own.
 *
 * Sources: [K] R. D. Keane & R. J. Adrian 1990, Meas. Sci. Technol. 1:1202, and 1992, Appl. Sci. Res. 49:191 (quarter of the window,
 * gradient, 7 to 10 pairs). Depth of field: diffraction limited, common text of optics. Common practice where said.
 */
import { requireRange } from '../base'

/** Largest displacement over the window [K]. */
export const DISPLACEMENT_SHARE = 0.25
/** Largest change of displacement across a window, pixels a pixel [K]. */
export const LARGEST_GRADIENT = 0.05
/** Vectors across the core, side by side (common practice). */
export const FEWEST_VECTORS = 8
/** Light sheet over the displacement out of its plane [K]: at most a quarter is lost. */
export const SHEET_OVER_DISPLACEMENT = 4
/** Speed out of the plane over the largest in it, for a ring cut along its axis (common practice). */
export const OUT_OF_PLANE_SHARE = 0.1
/** The ring moves this share of its radius from one pair to the next (common practice). */
export const STEP_OVER_RADIUS = 0.5

/**
 * Time between the two frames of a pair [s]: the largest displacement is a quarter of the window.
 *
 * @param window [pixels]
 * @param scale [pixels/m]
 * @param largestSpeed [m/s]
 */
export function pairInterval(window: number, scale: number, largestSpeed: number): number {
  requireRange('tankRun.camera.window', window, { above: 0, unit: 'pixels' })
  requireRange('tankRun.camera.scale', scale, { above: 0, unit: '1/m' })
  requireRange('largestSpeed', largestSpeed, { above: 0, unit: 'm/s' })
  return (DISPLACEMENT_SHARE * window) / (scale * largestSpeed)
}

/** Depth of field of a diffraction-limited lens, 4 (1 + 1/m)^2 N^2 lambda [m]. @param magnification m @param aperture N */
export function depthOfField(magnification: number, aperture: number, wavelength: number): number {
  requireRange('magnification', magnification, { above: 0 })
  requireRange('tankRun.camera.aperture', aperture, { above: 0 })
  requireRange('tankRun.camera.wavelength', wavelength, { above: 0, unit: 'm' })
  return 4 * (1 + 1 / magnification) ** 2 * aperture * aperture * wavelength
}

/** Thinnest light sheet that keeps its particles from frame to frame [m]. */
export function thinnestSheet(outOfPlaneSpeed: number, interval: number): number {
  return SHEET_OVER_DISPLACEMENT * outOfPlaneSpeed * interval
}

/** Bytes of a run. */
export function storageOf(frames: number, pixels: readonly [number, number], bytesPerPixel: number): number {
  return frames * pixels[0] * pixels[1] * bytesPerPixel
}

/** Particles in a volume of water [1/m3] for a number in each interrogation window. */
export function seedingDensity(particlesPerWindow: number, windowSize: number, sheetThickness: number): number {
  return particlesPerWindow / (windowSize * windowSize * sheetThickness)
}
