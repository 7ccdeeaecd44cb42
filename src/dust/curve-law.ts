import type { CurveOpacitySpec } from '../scene/types.js'
import { cardelli1989 } from './extinction/cardelli-1989.js'
import { pei1992 } from './extinction/pei-1992.js'
import type { OpacityCurves } from './opacity-curves.js'

/** A published extinction curve through a given opacity at one wavelength, shared out by a constant albedo. */
export function curveLaw({ curve, reference, scattering: { albedo, asymmetry } }: CurveOpacitySpec): OpacityCurves {
  const { ratio, range } = curve.name === 'cardelli-1989' ? cardelli1989(curve.rv) : pei1992(curve.galaxy)
  const unit = reference.extinction / ratio(reference.wavelength)
  return {
    absorption: (wavelength) => (1 - albedo) * unit * ratio(wavelength),
    scattering: (wavelength) => albedo * unit * ratio(wavelength),
    asymmetry: () => asymmetry,
    range,
    kinks: []
  }
}
