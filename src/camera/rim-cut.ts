import type { Walk } from '../grid/cells.js'
import type { Rims } from '../grid/rims.js'

/** Squared sine of the angle to the axis below which a ray is parallel to it. */
const PARALLEL = 1e-24

/** Where a ray runs between the cylinders that bound the dust: from `from[i]` to `to[i]` along its path, cm, for i = 0 and 1. */
export class RimCut {
  readonly from = new Float64Array(2)
  readonly to = new Float64Array(2)

  constructor(readonly rims: Rims) {}

  /** Finds them for the ray of a walk. */
  begin({ x0, y0, ux, uy }: Walk): void {
    const { inner, outer } = this.rims
    const across2 = ux * ux + uy * uy
    const parallel = across2 < PARALLEL
    const nearest = parallel ? 0 : -(x0 * ux + y0 * uy) / across2
    const nearest2 = (x0 + nearest * ux) ** 2 + (y0 + nearest * uy) ** 2
    const reach = (radius: number) => {
      const left = radius * radius - nearest2
      return left <= 0 ? 0 : parallel ? Number.POSITIVE_INFINITY : Math.sqrt(left / across2)
    }
    const [hole, edge] = [reach(inner), reach(outer)]
    this.from[0] = nearest - edge
    this.to[0] = nearest - hole
    this.from[1] = nearest + hole
    this.to[1] = nearest + edge
  }
}
