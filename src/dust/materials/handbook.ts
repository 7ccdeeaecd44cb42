import type { HandbookName } from '../../scene/types.js'
import { longitudinalTerm, type Oscillator, type OscillatorModel } from './oscillator-material.js'

/** Terms from rows of wavenumber (cm-1), strength, and damping relative to the wavenumber. */
const relative = (rows: readonly (readonly [number, number, number])[]): Oscillator[] =>
  rows.map(([at, strength, width]) => ({ at, strength, damping: width * at }))

/**
 * Published fits of Lorentz oscillators to the reflectance of crystals near 300 K. Of uniaxial crystals, the ordinary ray sees the
 * field across the axis (two thirds of randomly oriented grains) and the extraordinary ray along it.
 */
export const handbook = {
  /** Silicon carbide: Spitzer, Kleinman & Walsh (1959, Phys. Rev. 113, 127), as in Bohren & Huffman (1983), section 9.1. */
  'silicon-carbide': { infinity: 6.7, terms: [longitudinalTerm(6.7, 793, 969, 4.76)] },
  /** Magnesium oxide: Jasperse, Kahan, Plendl & Mitra (1966, Phys. Rev. 146, 526). */
  'magnesium-oxide': {
    infinity: 3.01,
    terms: relative([
      [401, 6.6, 0.019],
      [640, 0.045, 0.16]
    ])
  },
  /** Corundum, ordinary ray: Barker (1963, Phys. Rev. 132, 1474). */
  'corundum-ordinary': {
    infinity: 3.2,
    terms: relative([
      [385, 0.3, 0.015],
      [442, 2.7, 0.01],
      [569, 3, 0.02],
      [635, 0.3, 0.02]
    ])
  },
  /** Corundum, extraordinary ray: Barker (1963). */
  'corundum-extraordinary': {
    infinity: 3.1,
    terms: relative([
      [400, 6.8, 0.02],
      [583, 1.7, 0.035]
    ])
  },
  /** Alpha quartz, ordinary ray: Spitzer & Kleinman (1961, Phys. Rev. 121, 1324). */
  'quartz-ordinary': {
    infinity: 2.356,
    terms: relative([
      [394, 0.33, 0.007],
      [450, 0.82, 0.009],
      [695, 0.018, 0.019],
      [797, 0.11, 0.009],
      [1072, 0.67, 0.0071],
      [1163, 0.01, 0.006],
      [1227, 0.009, 0.11]
    ])
  }
} as const satisfies Record<HandbookName, OscillatorModel>
