import { TABLE_STEPS, tablePosition } from '../dust/scattering-tables.js'
import { type AzimuthShares, azimuthShares, startOf } from './azimuth-shares.js'

const tables = { even: azimuthShares(false), narrow: azimuthShares(true) }

/**
 * Light between azimuth bins that hold means: in each bin the parabola with the means of the bin and its neighbours, so that no light is
 * lost or won. U and V are odd about the observer's plane, all else is even. Where the intensity would be negative the light is flatter
 * about its mean, and no less (Zhang & Shu 2010, J. Comput. Phys. 229, 3091; from memory). Or `straight`: the intensity along lines
 * between the middles of bins, which has less noise, and does where the light is smooth.
 */
export class AzimuthCurve {
  /** The first of three bins that the light follows from, and their shares of the intensity, of Q, and of U and V. */
  start = 0
  readonly intensity = new Float64Array(3)
  readonly even = new Float64Array(3)
  readonly odd = new Float64Array(3)
  private readonly shares: AzimuthShares

  /** `narrow`: see azimuthLookup. */
  constructor(
    narrow: boolean,
    private readonly straight: boolean
  ) {
    this.shares = narrow ? tables.narrow : tables.even
  }

  /** The intensity at an azimuth of that cosine; its bins are the `values` from `base` on. */
  at(values: Float64Array, base: number, cosine: number): number {
    const { shares, intensity, even, odd, straight } = this
    const step = Math.min(TABLE_STEPS - 1, tablePosition(Math.max(-1, Math.min(1, cosine))) | 0)
    const bin = shares.bins[step]
    const start = startOf(bin)
    const a = values[base + start]
    const b = values[base + start + 1]
    const c = values[base + start + 2]
    const bent = straight ? 1 : this.bend(bin, values[base + bin], a, b, c)
    for (let i = 0; i < 3; i++) {
      const flat = start + i === bin ? 1 - bent : 0
      even[i] = flat + bent * shares.even[3 * step + i]
      odd[i] = flat + bent * shares.odd[3 * step + i]
      intensity[i] = straight ? shares.straight[3 * step + i] : even[i]
    }
    this.start = start
    return intensity[0] * a + intensity[1] * b + intensity[2] * c
  }

  /** How much of the parabola of a bin about its mean keeps it from being negative. */
  private bend(bin: number, mean: number, a: number, b: number, c: number): number {
    const { edges } = this.shares
    const low = 6 * bin
    const least = Math.min(
      edges[low] * a + edges[low + 1] * b + edges[low + 2] * c,
      edges[low + 3] * a + edges[low + 4] * b + edges[low + 5] * c
    )
    return least < 0 && mean >= 0 ? mean / (mean - least) : 1
  }
}
