import type { CameraInput, DriveInput, PracticeInput, TankInput, TankRunSection } from '../../../core/tank'

export const DRIVE: DriveInput = {
  maxTravel: null,
  maxSpeed: null,
  maxAcceleration: null,
  maxJerk: null,
  leak: 0,
  lag: 0,
}

export const PRACTICE: PracticeInput = { settlingMinutes: 3, clearance: 8, impulsiveStart: 0.2, particlesPerWindow: 8 }

export const CAMERA: CameraInput = {
  pixels: [1920, 1080],
  pixelPitch: 5e-6,
  scale: 4000,
  window: 32,
  maxFrameRate: 200,
  aperture: 4,
  refraction: true,
  bytesPerPixel: 1,
  wavelength: 532e-9,
  sheetThickness: null,
  standOff: 0.4,
  waterPath: 0.3,
  pairs: null,
}

export const NO_TANK: TankInput = { length: null, width: null, depth: null, bore: null }

/** Two stations in no tank at all. */
export function section(parts: Partial<TankRunSection> = {}): TankRunSection {
  return {
    tank: NO_TANK,
    nozzleDepth: null,
    stations: [0.1, 0.3],
    controllerStep: 0.001,
    target: null,
    camera: CAMERA,
    trigger: { camera: 0, laser: -0.1 },
    drive: DRIVE,
    practice: PRACTICE,
    matrix: null,
    ...parts,
  }
}
