import { henyeyGreenstein } from '../dust/phase-function.js'
import { elementAt, S11, S12 } from '../dust/scattering-tables.js'
import { dimensionsOf, isOctree, openWalk, reachOf, sphericalOf, type Walk } from '../grid/cells.js'
import { OctreeWalk } from '../grid/octree/octree-walk.js'
import type { SphericalWalk } from '../grid/walk.js'
import type { Vector } from '../scene/types.js'
import { GROUPS } from '../solve/groups.js'
import { ANGLE_NODES } from '../solve/scattered-light.js'
import { beamDepth, type StarBeam } from '../solve/star-beams.js'
import { BEAM_POINT, columnsBetween } from '../solve/star-columns.js'
import { pathToStar } from '../transport/star-spheres.js'
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
/** A ray is never nearer to a point star than this share of the reach of the cells. */
const TINY = 1e-9
/** A star hides another when it is nearer by more than this share of the reach: more than rounding. */
const HIDES = 1e-12
/** Within so many sides of its cell, the way to a star among cubes is followed. */
const NEAR = 2
/** The extinction of all components as that of one. */
const ONE = Float64Array.of(1)

/**
 * The formal solution of radiative transfer along rays to one observer: intensity is the integral of the emission coefficient
 * times exp(-optical depth to the observer), cell by cell with constant coefficients, from the observer inwards. First
 * scatterings of a point star vary within a cell and are summed at two Gauss points a step.
 */
export class RayIntegrator {
  private readonly walk: Walk
  private readonly dimensions: 1 | 2 | 3
  private readonly reach: number
  /** Beyond all cells and stars, cm. */
  private readonly far: number
  private readonly azimuthPosition: Float32Array
  /** Where rays start from and run to, turned into the half-plane of azimuth 0 in two dimensions. */
  private readonly view: ViewBasis
  /** Numbers that `trace` writes. */
  readonly size: number
  /** Starlight scattered once along the last ray, polarised along the radius in the picture. */
  private radial = 0
  private readonly stokes: StokesRay | undefined
  /** The same of every star among cubes. */
  private readonly radials: Float64Array
  /** Among cubes, the way to a star nearby. */
  private readonly shadow: OctreeWalk | undefined
  private readonly place = new Float64Array(3)

  constructor(
    private readonly medium: RayMedium,
    view: ViewBasis
  ) {
    this.view = view
    this.size = medium.polarising ? POLARISED_VALUES : RAY_VALUES
    this.stokes = medium.polarising ? new StokesRay(medium, view) : undefined
    this.walk = openWalk(medium.walls)
    this.dimensions = dimensionsOf(medium.walls)
    this.reach = reachOf(medium.walls)
    this.far = medium.spheres.reduce((sum, value, i) => sum + (i % 4 < 3 ? Math.abs(value) : Math.sqrt(value)), this.reach)
    this.shadow = isOctree(medium.walls) ? new OctreeWalk(medium.walls) : undefined
    this.radials = new Float64Array(medium.starlight?.beams.length ?? 0)
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
    const { medium, walk, stokes, dimensions } = this
    const { right, up, observer } = this.view
    const { extinction, emission, emissionGroups, scattered, scatteredGroups, slots, spheres } = medium
    out.fill(0, 0, this.size)
    this.radial = 0
    // A ray exactly through the origin would see a point star's halo diverge.
    const tiny = TINY * this.reach
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
    const starAt = spheres.length > 0 ? walk.s + pathToStar(walk, spheres) : Number.POSITIVE_INFINITY
    const hasEmissionGroups = withGroups && emissionGroups.length > 0
    const brightest = medium.starlight?.brightest
    const beams = medium.starlight?.beams
    const stars = beams ? beams.length : 0
    this.radials.fill(0)
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
        if (brightest && brightest[cell] * weight > NEGLIGIBLE * (out[EMITTED] + out[SCATTERED])) {
          if (stars === 0) out[SCATTERED] += this.firstScatterings(start, step, chi, depth, -1)
          for (let star = 0; star < stars; star++) out[SCATTERED] += this.firstScatterings(start, step, chi, depth, star)
        }
        depth += thickness
        transmission *= 1 - absorbed
      }
    } while (!atStar && depth < OPAQUE && walk.cross() >= 0)
    if (!stokes) return
    stokes.finish(x, y, this.radial, out, withGroups)
    beams?.forEach(({ at }, star) => {
      stokes.addRadial(x - dot(at, right), y - dot(at, up), this.radials[star], out)
    })
  }

  /**
   * Optical depth from the observer along the ray at (x, y) cm in the picture to a star: to its surface, or to the plane through its
   * centre where the ray misses it or it is a point. Infinite where another star stands in front.
   */
  depthTo(x: number, y: number, at: Vector, radius: number): number {
    const { medium, walk } = this
    const { right, up, observer } = this.view
    const { spheres, extinction } = medium
    const px = x * right[0] + y * up[0]
    const py = x * right[1] + y * up[1]
    const pz = x * right[2] + y * up[2]
    const middle = -dot(at, observer)
    const depth2 = radius * radius - (x - dot(at, right)) ** 2 - (y - dot(at, up)) ** 2
    const end = middle - (depth2 > 0 ? Math.sqrt(depth2) : 0)
    if (spheres.length > 0) {
      const [ux, uy, uz] = observer.map((component) => -component)
      const { far } = this
      walk.turn(px - far * ux, py - far * uy, pz - far * uz, ux, uy, uz)
      if (walk.s + pathToStar(walk, spheres) < end - HIDES * far) return Number.POSITIVE_INFINITY
    }
    if (!walk.enter(px, py, pz, -observer[0], -observer[1], -observer[2])) return 0
    let depth = 0
    do {
      const start = walk.s
      const step = Math.min(walk.toWall(), end - start)
      if (step > 0) depth += step * extinction[walk.cell]
    } while (walk.sWall < end && walk.cross() >= 0)
    return depth
  }

  /**
   * Light scattered once between two points of the present cell, dimmed by `depth` and by the cell itself: that of the point stars at
   * the centre of spherical cells (-1), or of one star among cubes.
   */
  private firstScatterings(start: number, step: number, chi: number, depth: number, star: number): number {
    const { walk, medium } = this
    const { asymmetry, scattering, tables, beams } = medium.starlight!
    const { cells } = medium
    const { cell } = walk
    const laws = asymmetry.length
    if (laws === 1 && scattering[cell] === 0) return 0
    const beam = star < 0 ? undefined : beams[star]
    let { b2 } = walk
    // Where the ray passes the star.
    let passes = 0
    let before = 0
    let rInner = 0
    if (beam) {
      const [x, y, z] = beam.at
      passes = x * walk.ux + y * walk.uy + z * walk.uz
      b2 += x * x + y * y + z * z - 2 * (x * walk.x0 + y * walk.y0 + z * walk.z0) - passes * passes
      b2 = Math.max(b2, (TINY * this.reach) ** 2)
    } else {
      const { ir, it, ip, np, nr } = walk as SphericalWalk
      before = medium.starlight!.opticalDepth[(ir === 0 ? 0 : it * np + ip) * (nr + 1) + ir]
      rInner = sphericalOf(medium.walls).r[ir]
      if (before + depth > OPAQUE) return 0
    }
    const first = start - passes
    const last = first + step
    const nearest2 = first < 0 && last > 0 ? b2 : b2 + Math.min(first * first, last * last)
    const steep = step * step > STEEP * STEEP * nearest2
    // Across a large part of the distance to the star the sum is over alpha, with s = b tan(alpha) and ds / r^2 = d(alpha) / b.
    const b = Math.sqrt(b2)
    const from = steep ? Math.atan2(first, b) : first
    const range = (steep ? Math.atan2(last, b) : last) - from
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
      const fromStar = beam ? this.depthOnBeam(beam, s + passes, r2) : before + chi * (r > rInner ? r - rInner : 0)
      const dimming = Math.exp(-fromStar - depth - chi * (s - first)) / (steep ? b : r2)
      sum += source * dimming
      radial += polarised * dimming
    }
    const luminosity = beam ? beam.luminosity : medium.starlight!.luminosity
    const scale = (luminosity / (4 * Math.PI)) * 0.5 * width
    if (beam) this.radials[star] += radial * scale
    else this.radial += radial * scale
    return sum * scale
  }

  /** Optical depth from a star among cubes to the point at `s` of the ray, sqrt(r2) from it: from the table, or near the star along the way. */
  private depthOnBeam(beam: StarBeam, s: number, r2: number): number {
    const { place, medium } = this
    const walk = this.walk as OctreeWalk
    const x = walk.x0 + s * walk.ux
    const y = walk.y0 + s * walk.uy
    const z = walk.z0 + s * walk.uz
    const side = walk.within(x, y, z, place)
    const { cell } = walk
    if (r2 < NEAR * NEAR * side * side)
      return columnsBetween(this.shadow!, medium.extinction, ONE, medium.spheres, x, y, z, cell, beam.at, place)
    const u = 0.5 + (0.5 / BEAM_POINT) * place[0]
    const v = 0.5 + (0.5 / BEAM_POINT) * place[1]
    const w = 0.5 + (0.5 / BEAM_POINT) * place[2]
    const low =
      (beamDepth(beam, cell, 0) * (1 - u) + beamDepth(beam, cell, 1) * u) * (1 - v) +
      (beamDepth(beam, cell, 2) * (1 - u) + beamDepth(beam, cell, 3) * u) * v
    const high =
      (beamDepth(beam, cell, 4) * (1 - u) + beamDepth(beam, cell, 5) * u) * (1 - v) +
      (beamDepth(beam, cell, 6) * (1 - u) + beamDepth(beam, cell, 7) * u) * v
    return Math.max(low * (1 - w) + high * w, 0)
  }
}

function dot(a: Vector, b: Vector): number {
  return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
}
