import { complex } from '../../math/complex.js'
import type { ConstantsSpec, MixturePart } from '../../scene/types.js'
import { handbook } from './handbook.js'
import type { Material } from './material.js'
import { bruggemanMaterial, type MaterialShare, maxwellGarnettMaterial, vacuum } from './mixed-material.js'
import { oscillatorMaterial } from './oscillator-material.js'
import { tabulatedMaterial } from './tabulated-material.js'

/** The material that a scene describes. */
export function makeMaterial(spec: ConstantsSpec): Material {
  switch (spec.kind) {
    case 'table':
      return tabulatedMaterial(spec.table)
    case 'oscillators':
      return oscillatorMaterial(spec)
    case 'handbook':
      return oscillatorMaterial(handbook[spec.name])
    case 'constant':
      return { index: () => complex(spec.n, spec.k), range: [0, Number.POSITIVE_INFINITY] }
    case 'bruggeman': {
      // Fractions written with few digits may miss 1 by a little.
      const total = spec.parts.reduce((sum, { volumeFraction }) => sum + volumeFraction, 0)
      return bruggemanMaterial(shares(spec.parts, total))
    }
    case 'maxwell-garnett':
      return maxwellGarnettMaterial(makeMaterial(spec.matrix), shares(spec.inclusions, 1))
  }
}

/** A solid with a share of vacuum in its volume, by Bruggeman's rule. */
export function porousMaterial(material: Material, porosity: number): Material {
  if (porosity === 0) return material
  return bruggemanMaterial([
    { material, share: 1 - porosity },
    { material: vacuum, share: porosity }
  ])
}

function shares(parts: MixturePart[], total: number): MaterialShare[] {
  return parts.map(({ constants, volumeFraction }) => ({ material: makeMaterial(constants), share: volumeFraction / total }))
}
