/** A published formula for the wavelength dependence of extinction. */
export interface ExtinctionCurve {
  /** Extinction at a wavelength (cm) relative to that in the band the formula is written for. */
  ratio: (wavelength: number) => number
  /** Wavelengths (cm) between which the formula is published; beyond them it is extrapolated. */
  range: [number, number]
}
