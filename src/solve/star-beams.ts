import type { DustComponent } from '../model/model.js'
import type { Vector } from '../scene/types.js'
import { DARK, type StarColumns } from './star-columns.js'

/** The light of a point star at one wavelength on its way through cubes. */
export interface StarBeam {
  at: Vector
  /** erg/s/Hz */
  luminosity: number
  /** See StarColumns. */
  columns: Float32Array
  /** Extinction opacity by component, cm2/g. */
  opacity: Float64Array
}

/** The point stars that shine at a wavelength (cm), frequency nu (Hz). */
export function starBeams(stars: StarColumns[], components: DustComponent[], wavelength: number, nu: number): StarBeam[] {
  const opacity = Float64Array.from(components, ({ law }) => law.absorption(wavelength) + law.scattering(wavelength))
  return stars.flatMap(({ star: { spec, spectrum }, columns }) => {
    const luminosity = spectrum.luminosityNu(nu)
    return luminosity > 0 ? [{ at: spec.at, luminosity, columns, opacity }] : []
  })
}

/** Optical depth from the star to point k of a cell, DARK at most. */
export function beamDepth({ columns, opacity }: StarBeam, cell: number, k: number): number {
  const components = opacity.length
  let depth = 0
  for (let c = 0; c < components; c++) depth += opacity[c] * columns[(cell * components + c) * 8 + k]
  return Math.min(depth, DARK)
}
