import type { MatrixElements } from '../mie/scattering-matrix.js'
import { emptyOptics, type GrainOptics } from './grain-optics.js'

/**
 * Separate grains of several kinds in one component: their optics, at the same wavelengths and angles, with the share of the mass of
 * each (summing to 1). Opacities add by mass; asymmetry and matrix by scattering.
 */
export function mixByMass(kinds: readonly { optics: GrainOptics; share: number }[]): GrainOptics {
  const { wavelengths, cosines } = kinds[0].optics
  const mixed = emptyOptics(wavelengths, cosines)
  const count = cosines.length
  const elements: (keyof MatrixElements)[] = ['s11', 's12', 's33', 's34']
  for (let w = 0; w < wavelengths.length; w++) {
    for (const { optics, share } of kinds) {
      mixed.absorption[w] += share * optics.absorption[w]
      mixed.scattering[w] += share * optics.scattering[w]
      mixed.error[w] = Math.max(mixed.error[w], optics.error[w])
    }
    if (mixed.scattering[w] === 0) continue
    for (const { optics, share } of kinds) {
      const part = (share * optics.scattering[w]) / mixed.scattering[w]
      mixed.asymmetry[w] += part * optics.asymmetry[w]
      for (const element of elements)
        for (let i = w * count; i < (w + 1) * count; i++) mixed.matrix[element][i] += part * optics.matrix[element][i]
    }
  }
  return mixed
}
