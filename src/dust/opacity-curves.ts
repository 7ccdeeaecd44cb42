import type { ScatteringMatrix } from './scattering-matrix.js'

/** Optical properties of one kind of dust as functions of wavelength (cm). */
export interface OpacityCurves {
  /** Absorption opacity, cm2 per gram of dust. */
  absorption: (wavelength: number) => number
  /** Scattering opacity, cm2 per gram of dust. */
  scattering: (wavelength: number) => number
  /** Mean cosine of the scattering angle; 0 at every wavelength when scattering is isotropic. */
  asymmetry: (wavelength: number) => number
  /** Scattering matrix at a wavelength, of a law whose light is followed with its polarisation. */
  matrix?: (wavelength: number) => ScatteringMatrix
  /** Wavelengths (cm) between which the law is given; beyond them it is extrapolated. */
  range: [number, number]
  /** Largest relative error of what the law was computed from, and its wavelength (cm), where there is one. */
  roughness?: { error: number; wavelength: number }
  /** Wavelengths (cm, increasing) where a curve bends sharply. */
  kinks: number[]
}
