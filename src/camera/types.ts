import type { CameraSpec, SpectrumSpec } from '../scene/types.js'
import type { StokesPlanes } from './stokes-planes.js'

/**
 * Specific-intensity images of one camera, cgs (erg/s/cm2/Hz/sr).
 * Every array holds wavelengths x height x width values: index (k * height + y) * width + x, with x to the right (west)
 * and y up (north), so index 0 is the lower left corner of the first wavelength.
 */
export interface CameraImages {
  camera: CameraSpec
  width: number
  height: number
  total: Float64Array
  /** 1 sigma of the Monte Carlo part. */
  sigma: Float64Array
  /** wavelengths x GROUPS x height x width: the noise behind `sigma` (`noise-modes.ts`), in steps of sigma / MODE_STEPS. */
  modes: Int8Array
  direct: Float64Array
  emitted: Float64Array
  scattered: Float64Array
  /** Where some dust polarises. */
  stokes?: StokesPlanes
  /** The stars whose light is in `direct`, wherever in the pixels they lie. */
  stars: StarOnSky[]
  /** Ambient light that dust and stars take out of the line of sight, no part of the total; absent without ambient fields. */
  deficit?: Float64Array
  /** For each wavelength: the estimated relative error of placing the rays, weighted by flux. */
  samplingError: number[]
  /** For each wavelength: about how much light of the dust lies beyond the edges, as a sum over such pixels; 0 where it is not known. */
  beyond: number[]
  /** Dust along the line of sight, absent without any: g/cm2 (height x width, as one wavelength), and the error of placing rays. */
  column?: { density: Float64Array; samplingError: number }
}

/** A star as an observer sees it; angles in rad from the centre of the picture, or, from a place of the scene, its longitude and latitude. */
export interface StarOnSky {
  name: string
  east: number
  north: number
  /** Angular radius; 0 for a point. */
  radius: number
  /** Linear limb-darkening coefficient. */
  limbDarkening: number
  /** Flux density dimmed by the dust, one value a wavelength, erg/s/cm2/Hz. */
  flux: Float64Array
}

/** Flux densities in an aperture, cgs (erg/s/cm2/Hz); one value a wavelength. */
export interface ApertureSpectrum {
  spectrum: SpectrumSpec
  total: Float64Array
  sigma: Float64Array
  direct: Float64Array
  emitted: Float64Array
  scattered: Float64Array
  /** Where some dust polarises. */
  stokes?: StokesPlanes
  /** As in `CameraImages`. */
  deficit?: Float64Array
  samplingError: number[]
}
