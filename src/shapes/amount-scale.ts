import type { AmountSpec } from '../scene/types.js'
import type { Shape } from './shape.js'

/** The amount asked for does not fix the density of the shape. `key` is the key of `amount` at fault. */
export class AmountError extends Error {
  constructor(
    readonly key: 'mass' | 'optical-depth' | 'at',
    message: string
  ) {
    super(message)
    this.name = 'AmountError'
  }
}

/**
 * The factor that turns the relative density of a shape into g/cm3.
 * `extinctionOpacityAt` gives absorption plus scattering, cm2/g, at a wavelength in cm.
 * Throws `AmountError` when no factor, or any factor, would do.
 */
export function amountScale(shape: Shape, amount: AmountSpec, extinctionOpacityAt: (wavelength: number) => number): number {
  switch (amount.kind) {
    case 'mass':
      if (!Number.isFinite(shape.totalMass))
        throw new AmountError('mass', 'the mass of this shape is infinite at its centre; give `inner` above 0')
      return amount.mass / shape.totalMass
    case 'optical-depth': {
      if (!(shape.column > 0))
        throw new AmountError('optical-depth', 'there is no dust on the line along which it is measured; give a mass')
      if (!Number.isFinite(shape.column)) {
        throw new AmountError(
          'optical-depth',
          shape.innerRadius > 0
            ? 'the midplane optical depth of rotating infall is infinite at its centrifugal radius; give a mass, or a density at another radius'
            : 'the optical depth of this shape is infinite at its centre; give `inner` above 0, or a mass'
        )
      }
      const opacity = extinctionOpacityAt(amount.at)
      if (!(opacity > 0)) throw new AmountError('at', 'the dust has no extinction at this wavelength; choose one where it has')
      return amount.opticalDepth / (opacity * shape.column)
    }
    case 'density': {
      const density = shape.relativeDensity(amount.at, 0, 0)
      if (!(density > 0 && Number.isFinite(density))) {
        throw new AmountError('at', 'the shape has no finite density at this radius; choose one between its inner and outer edge')
      }
      return amount.density / density
    }
  }
}
