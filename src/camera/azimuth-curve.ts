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
  /** How much of the parabola is left of it. */
  private bent = 1

  /** `narrow`: see azimuthLookup. */
  constructor(
    narrow: boolean,
    private readonly straight: boolean
  ) {
    this.shares = narrow ? tables.narrow : tables.even
  }

  /** The intensity at an azimuth of that cosine; its bins are the `values` from `base` on. Leaves `even` and `odd` as they were. */
  intensityAt(values: Float64Array, base: number, cosine: number): number {
    const { shares, intensity, straight } = this
    const step = stepAt(cosine)
    const bin = shares.bins[step]
    const start = startOf(bin)
    const a = values[base + start]
    const b = values[base + start + 1]
    const c = values[base + start + 2]
    const from = straight ? shares.straight : shares.even
    intensity[0] = from[3 * step]
    intensity[1] = from[3 * step + 1]
    intensity[2] = from[3 * step + 2]
    this.start = start
    this.bent = straight ? 1 : this.bend(bin, values[base + bin], a, b, c)
    if (this.bent < 1) {
      for (let i = 0; i < 3; i++) intensity[i] *= this.bent
      intensity[bin - start] += 1 - this.bent
    }
    return intensity[0] * a + intensity[1] * b + intensity[2] * c
  }

  /** The same, with the shares of the other Stokes parameters. */
  at(values: Float64Array, base: number, cosine: number): number {
    const value = this.intensityAt(values, base, cosine)
    const { shares, even, odd, start, bent } = this
    const step = stepAt(cosine)
    const flat = shares.bins[step] - start
    for (let i = 0; i < 3; i++) {
      even[i] = bent * shares.even[3 * step + i]
      odd[i] = bent * shares.odd[3 * step + i]
    }
    even[flat] += 1 - bent
    odd[flat] += 1 - bent
    return value
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

const stepAt = (cosine: number) => Math.min(TABLE_STEPS - 1, tablePosition(Math.max(-1, Math.min(1, cosine))) | 0)
