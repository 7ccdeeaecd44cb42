import { type Complex, complex, multiply, squareRoot } from '../../math/complex.js'
import type { Material } from './material.js'
import { bruggeman, type Ingredient, maxwellGarnett } from './mixing-rules.js'

/** A material and its share of the volume. */
export interface MaterialShare {
  material: Material
  share: number
}

export const vacuum: Material = { index: () => complex(1), range: [0, Number.POSITIVE_INFINITY] }

/** Mixture by Bruggeman's rule; the shares sum to 1. Porosity is a share of `vacuum`. */
export function bruggemanMaterial(parts: readonly MaterialShare[]): Material {
  return {
    index: (wavelength) => squareRoot(bruggeman(ingredientsAt(parts, wavelength))),
    range: commonRange(parts.map(({ material }) => material))
  }
}

/** Mixture by Maxwell Garnett's rule; the matrix has what the shares of the inclusions leave. */
export function maxwellGarnettMaterial(matrix: Material, inclusions: readonly MaterialShare[]): Material {
  return {
    index: (wavelength) => squareRoot(maxwellGarnett(permittivityAt(matrix, wavelength), ingredientsAt(inclusions, wavelength))),
    range: commonRange([matrix, ...inclusions.map(({ material }) => material)])
  }
}

function permittivityAt(material: Material, wavelength: number): Complex {
  const index = material.index(wavelength)
  return multiply(index, index)
}

function ingredientsAt(parts: readonly MaterialShare[], wavelength: number): Ingredient[] {
  return parts.map(({ material, share }) => ({ permittivity: permittivityAt(material, wavelength), share }))
}

function commonRange(materials: readonly Material[]): [number, number] {
  return [Math.max(...materials.map(({ range }) => range[0])), Math.min(...materials.map(({ range }) => range[1]))]
}
