import { henyeyGreenstein } from '../dust/phase-function.js'
import { elementAt, S11, S12 } from '../dust/scattering-tables.js'
import { SphericalWalk } from '../grid/walk.js'
import { GROUPS } from '../solve/groups.js'
import { ANGLE_NODES } from '../solve/scattered-light.js'
import type { RayMedium } from './ray-medium.js'
import { EMITTED, FIRST_GROUP, POLARISED_VALUES, RAY_VALUES, SCATTERED } from './ray-values.js'
import { AZIMUTH_LOOKUP, StokesRay } from './stokes-ray.js'
import type { ViewBasis } from './view.js'

/** Beyond this optical depth nothing is seen. */
const OPAQUE = 40
/** Below this optical depth two terms of the exponential do. */
const THIN = 1e-4
/** First scatterings in a cell are left out where they cannot add this share to what the ray has gathered. */
const NEGLIGIBLE = 1e-6
/** A path longer than this share of its distance to the star is summed over the angle at the star. */
const STEEP = 0.5
/** Largest steps of that angle (rad) and of optical depth in the two-point sums over first scatterings, and most steps a cell. */
const ANGLE_STEP = 0.4
const DEPTH_STEP = 1
const MOST_PIECES = 32
const GAUSS = 0.5 - 0.5 / Math.sqrt(3)

/**
 * The formal solution of radiative transfer along rays to one observer: intensity is the integral of the emission coefficient
 * times exp(-optical depth to the observer), cell by cell with constant coefficients, from the observer inwards. First
 * scatterings of a point star vary within a cell and are summed at two Gauss points a step.
 */
export class RayIntegrator {
  private readonly walk: SphericalWalk
  private readonly azimuthPosition: Float32Array
  /** Where rays start from and run to, turned into the half-plane of azimuth 0 in two dimensions. */
  private readonly view: ViewBasis
  /** Numbers that `trace` writes. */
  readonly size: number
  /** Starlight scattered once along the last ray, polarised along the radius in the picture. */
  private radial = 0
  private readonly stokes: StokesRay | undefined

  constructor(
    private readonly medium: RayMedium,
    view: ViewBasis
  ) {
    this.view = view
    this.size = medium.polarising ? POLARISED_VALUES : RAY_VALUES
    this.stokes = medium.polarising ? new StokesRay(medium, view) : undefined
    this.walk = new SphericalWalk(medium.walls)
    this.azimuthPosition = Float32Array.from({ length: AZIMUTH_LOOKUP + 1 }, (_, i) => {
      const angle = Math.acos(Math.min(1, -1 + (2 * (i + 0.5)) / AZIMUTH_LOOKUP))
      return Math.min(medium.slots - 1, Math.max(0, (angle / Math.PI) * medium.slots - 0.5))
    })
  }

  /**
   * Intensity (erg/s/cm2/Hz/sr) towards the observer along the ray at (x, y) cm in the picture, without the direct light of
   * stars, into `out` (`size` numbers); the deviations of the groups only when `withGroups`. Stokes parameters refer to the
   * picture's north, in one dimension to the radius in the picture.
   */
  trace(x: number, y: number, out: Float64Array, withGroups: boolean): void {
    const { medium, walk, stokes } = this
    const { right, up, observer } = this.view
    const { extinction, emission, emissionGroups, scattered, scatteredGroups, slots, starRadius } = medium
    const dimensions = walk.np > 1 ? 3 : walk.nt > 1 ? 2 : 1
    out.fill(0, 0, this.size)
    this.radial = 0
    // A ray exactly through the origin would see a point star's halo diverge.
    const tiny = 1e-9 * medium.walls.r[walk.nr]
    if (x * x + y * y < tiny * tiny) x = tiny
    const entered = walk.enter(
      x * right[0] + y * up[0],
      x * right[1] + y * up[1],
      x * right[2] + y * up[2],
      -observer[0],
      -observer[1],
      -observer[2]
    )
    if (!entered) return
    const starAt = walk.b2 < starRadius * starRadius ? -Math.sqrt(starRadius * starRadius - walk.b2) : Number.POSITIVE_INFINITY
    const hasEmissionGroups = withGroups && emissionGroups.length > 0
    const brightest = medium.starlight?.brightest
    let depth = 0
    let atStar = false
    let transmission = 1
    do {
      const cell = walk.cell
      const start = walk.s
      let step = walk.toWall()
      atStar = start + step >= starAt
      if (atStar) step = Math.max(0, starAt - start)
      const chi = extinction[cell]
      if (chi > 0 && step > 0) {
        const thickness = chi * step
        // To 2e-9 where the cell is thin, as most are.
        const absorbed = thickness < THIN ? thickness * (1 - 0.5 * thickness) : -Math.expm1(-thickness)
        const weight = (transmission * absorbed) / chi
        out[EMITTED] += weight * emission[cell]
        if (hasEmissionGroups) for (let g = 0; g < GROUPS; g++) out[FIRST_GROUP + g] += weight * emissionGroups[cell * GROUPS + g]
        if (slots > 0) {
          const s = start + 0.5 * step
          let index = cell
          let share = 0
          let side = 1
          if (dimensions === 1) {
            // cos of the angle to the observer, who stands towards negative s.
            const cosine = -s / Math.sqrt(walk.b2 + s * s)
            const position = Math.sqrt(0.5 * (1 - cosine)) * (ANGLE_NODES - 1)
            const node = Math.min(ANGLE_NODES - 2, position | 0)
            index = cell * ANGLE_NODES + node
            share = position - node
          } else if (dimensions === 2) {
            const px = walk.x0 + s * walk.ux
            const py = walk.y0 + s * walk.uy
            const rho = Math.sqrt(px * px + py * py)
            const entry = rho > 0 ? ((px / rho + 1) * (AZIMUTH_LOOKUP / 2)) | 0 : 0
            const position = this.azimuthPosition[entry]
            if (stokes) side = py < 0 ? -stokes.oddness[entry] : stokes.oddness[entry]
            const bin = Math.min(slots - 2, position | 0)
            index = cell * slots + bin
            share = position - bin
          }
          out[SCATTERED] +=
            weight * (share > 0 ? scattered[index] + share * (scattered[index + 1] - scattered[index]) : scattered[index])
          if (withGroups) {
            const near = weight * (1 - share)
            const far = weight * share
            const at = index * GROUPS
            // Where the share is none there may be no next bin.
            if (far === 0) for (let g = 0; g < GROUPS; g++) out[FIRST_GROUP + g] += near * scatteredGroups[at + g]
            else
              for (let g = 0; g < GROUPS; g++)
                out[FIRST_GROUP + g] += near * scatteredGroups[at + g] + far * scatteredGroups[at + GROUPS + g]
          }
          if (stokes) stokes.add(index, share, side, weight, out, withGroups)
        }
        if (brightest && brightest[cell] * weight > NEGLIGIBLE * (out[EMITTED] + out[SCATTERED]))
          out[SCATTERED] += this.firstScatterings(start, step, chi, depth)
        depth += thickness
        transmission *= 1 - absorbed
      }
    } while (!atStar && depth < OPAQUE && walk.cross() >= 0)
    if (stokes) stokes.finish(x, y, this.radial, out, withGroups)
  }

  /** Optical depth from the observer to the surface of a star, or to the plane through the origin where there is none. */
  depthToOrigin(x: number, y: number): number {
    const { medium, walk } = this
    const { right, up, observer } = this.view
    const { starRadius, extinction } = medium
    const enters = walk.enter(
      x * right[0] + y * up[0],
      x * right[1] + y * up[1],
      x * right[2] + y * up[2],
      -observer[0],
      -observer[1],
      -observer[2]
    )
    if (!enters) return 0
    const end = walk.b2 < starRadius * starRadius ? -Math.sqrt(starRadius * starRadius - walk.b2) : 0
    let depth = 0
    do {
      const start = walk.s
      const step = Math.min(walk.toWall(), end - start)
      if (step > 0) depth += step * extinction[walk.cell]
    } while (walk.sWall < end && walk.cross() >= 0)
    return depth
  }

  /** Starlight scattered once between two points of the present cell, dimmed by `depth` and by the cell itself. */
  private firstScatterings(start: number, step: number, chi: number, depth: number): number {
    const { walk, medium } = this
    const { luminosity, opticalDepth, asymmetry, scattering, tables } = medium.starlight!
    const { cells } = medium
    const { cell, ir, b2 } = walk
    const column = ir === 0 ? 0 : walk.it * walk.np + walk.ip
    const before = opticalDepth[column * (walk.nr + 1) + ir] + depth
    if (before > OPAQUE) return 0
    const laws = asymmetry.length
    if (laws === 1 && scattering[cell] === 0) return 0
    const rInner = medium.walls.r[ir]
    const end = start + step
    const nearest2 = start < 0 && end > 0 ? b2 : b2 + Math.min(start * start, end * end)
    const steep = step * step > STEEP * STEEP * nearest2
    // Across a large part of the distance to the star the sum is over alpha, with s = b tan(alpha) and ds / r^2 = d(alpha) / b.
    const b = Math.sqrt(b2)
    const from = steep ? Math.atan2(start, b) : start
    const range = (steep ? Math.atan2(end, b) : end) - from
    const pieces = Math.min(MOST_PIECES, Math.ceil(Math.max(steep ? range / ANGLE_STEP : 1, (chi * step) / DEPTH_STEP)))
    const width = range / pieces
    let sum = 0
    let radial = 0
    for (let i = 0; i < 2 * pieces; i++) {
      const at = from + width * ((i >> 1) + (i % 2 === 0 ? GAUSS : 1 - GAUSS))
      const s = steep ? b * Math.tan(at) : at
      const r2 = b2 + s * s
      const r = Math.sqrt(r2)
      const cosine = -s / r
      let source = 0
      let polarised = 0
      if (tables) {
        for (let law = 0; law < laws; law++) {
          source += scattering[law * cells + cell] * elementAt(tables, law, S11, cosine)
          polarised += scattering[law * cells + cell] * elementAt(tables, law, S12, cosine)
        }
      } else {
        for (let law = 0; law < laws; law++) source += scattering[law * cells + cell] * henyeyGreenstein(asymmetry[law], cosine)
      }
      const dimming = Math.exp(-before - chi * ((r > rInner ? r - rInner : 0) + s - start)) / (steep ? b : r2)
      sum += source * dimming
      radial += polarised * dimming
    }
    const scale = (luminosity / (4 * Math.PI)) * 0.5 * width
    this.radial += radial * scale
    return sum * scale
  }
}
