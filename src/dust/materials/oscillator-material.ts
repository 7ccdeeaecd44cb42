import { add, type Complex, complex, divide, squareRoot } from '../../math/complex.js'
import type { Material } from './material.js'

/** One Lorentz oscillator; w stands for wavenumber. */
export interface Oscillator {
  /** Wavenumber of the (transverse) resonance, cm-1. */
  at: number
  /** Its part of the static permittivity, dimensionless. */
  strength: number
  /** Full width of the resonance, cm-1. */
  damping: number
}

export interface OscillatorModel {
  /** Permittivity far above the resonances. */
  infinity: number
  terms: readonly Oscillator[]
}

/** Permittivity infinity + sum strength at^2 / (at^2 - w^2 - i damping w) at a wavenumber w in cm-1 (Lorentz 1909). */
export function oscillatorPermittivity({ infinity, terms }: OscillatorModel, wavenumber: number): Complex {
  return terms.reduce(
    (sum, { at, strength, damping }) =>
      add(sum, divide(complex(strength * at * at), complex((at - wavenumber) * (at + wavenumber), -damping * wavenumber))),
    complex(infinity)
  )
}

/** Material of Lorentz oscillators, at every wavelength. */
export function oscillatorMaterial(model: OscillatorModel): Material {
  return {
    index: (wavelength) => squareRoot(oscillatorPermittivity(model, 1 / wavelength)),
    range: [0, Number.POSITIVE_INFINITY]
  }
}

/**
 * The term of infinity (1 + (longitudinal^2 - transverse^2) / (transverse^2 - w^2 - i damping w)): an oscillator given by its
 * transverse and longitudinal wavenumbers, cm-1 (Lyddane, Sachs & Teller 1941, Phys. Rev. 59, 673).
 */
export function longitudinalTerm(infinity: number, transverse: number, longitudinal: number, damping: number): Oscillator {
  return { at: transverse, strength: infinity * ((longitudinal / transverse) ** 2 - 1), damping }
}
