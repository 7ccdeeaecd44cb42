import type { Complex } from '../../math/complex.js'

/** What a grain is made of. */
export interface Material {
  /** Complex refractive index n + i k, k >= 0 (time factor exp(-i omega t)), at a wavelength in vacuum, cm. */
  index: (wavelength: number) => Complex
  /** Wavelengths (cm) between which it is known; beyond them it is extrapolated. */
  range: [number, number]
}
