import { henyeyGreenstein } from '../dust/phase-function.js'
import { elementAt, S11, S12 } from '../dust/scattering-tables.js'
import { isOctree, openWalk, reachOf, sphericalOf, type Walk } from '../grid/cells.js'
import { OctreeWalk } from '../grid/octree/octree-walk.js'
import type { SphericalWalk } from '../grid/walk.js'
import { GROUPS } from '../solve/groups.js'
import { beamDepth, type StarBeam } from '../solve/star-beams.js'
import { BEAM_POINT, columnsBetween } from '../solve/star-columns.js'
import { pathToStar } from '../transport/star-spheres.js'
import type { RayMedium } from './ray-medium.js'
import { EMITTED, FIRST_GROUP, POLARISED_VALUES, RAY_VALUES, SCATTERED } from './ray-values.js'
import { RimCut } from './rim-cut.js'
import { ScatteredRay } from './scattered-ray.js'
import { Sight, type View } from './sight.js'
import { StokesRay } from './stokes-ray.js'

/** Beyond this optical depth nothing is seen. */
const OPAQUE = 30
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
  private readonly reach: number
  private readonly scatteredRay: ScatteredRay
  private readonly sight: Sight
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
  private readonly rimCut: RimCut | undefined

  constructor(
    private readonly medium: RayMedium,
    /** In two dimensions turned into the half-plane of azimuth 0. */
    private readonly view: View
  ) {
    this.sight = new Sight(view, medium.walls)
    this.size = medium.polarising ? POLARISED_VALUES : RAY_VALUES
    this.stokes = medium.polarising ? new StokesRay(medium, view, this.sight) : undefined
    this.walk = openWalk(medium.walls)
    this.reach = reachOf(medium.walls)
    this.shadow = isOctree(medium.walls) ? new OctreeWalk(medium.walls) : undefined
    this.radials = new Float64Array(medium.starlight?.beams.length ?? 0)
    this.scatteredRay = new ScatteredRay(medium)
    this.rimCut = medium.rims && new RimCut(medium.rims)
  }

  /**
   * Intensity (erg/s/cm2/Hz/sr) towards the observer along the ray at (x, y) cm in the picture, without the direct light of
   * stars, into `out` (`size` numbers); the deviations of the groups only when `withGroups`. Stokes parameters refer to
   * north (see Sight.directionTo), in one dimension to the direction to the origin.
   */
  trace(x: number, y: number, out: Float64Array, withGroups: boolean): void {
    const { medium, walk, stokes, scatteredRay, rimCut } = this
    const { extinction, emission, emissionGroups, slots, spheres } = medium
    out.fill(0, 0, this.size)
    this.radial = 0
    // A ray exactly through the origin would see a point star's halo diverge.
    const tiny = TINY * this.reach
    if ('observer' in this.view && x * x + y * y < tiny * tiny) x = tiny
    this.sight.look(x, y)
    if (!this.sight.enter(walk)) return
    scatteredRay.begin(walk.ux, walk.uy, walk.uz)
    rimCut?.begin(walk)
    const shares = rimCut?.rims.filled
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
      const mean = extinction[cell]
      if (mean > 0 && step > 0) {
        const filled = shares ? shares[cell] : 1
        const pieces = filled === 1 ? 1 : 2
        for (let i = 0; i < pieces; i++) {
          const from = pieces === 1 ? start : Math.max(start, rimCut!.from[i])
          const path = pieces === 1 ? step : Math.min(start + step, rimCut!.to[i]) - from
          if (!(path > 0)) continue
          const thickness = pieces === 1 ? mean * walk.weighed(path) : (mean / filled) * path
          // To 2e-9 where the cell is thin, as most are.
          const absorbed = thickness < THIN ? thickness * (1 - 0.5 * thickness) : -Math.expm1(-thickness)
          const weight = (transmission * absorbed) / mean
          out[EMITTED] += weight * emission[cell]
          if (hasEmissionGroups)
            for (let g = 0; g < GROUPS; g++) out[FIRST_GROUP + g] += weight * emissionGroups[cell * GROUPS + g]
          if (slots > 0) scatteredRay.add(walk, from + 0.5 * path, weight, out, withGroups)
          if (brightest && brightest[cell] * weight > NEGLIGIBLE * (out[EMITTED] + out[SCATTERED])) {
            if (stars === 0) out[SCATTERED] += this.firstScatterings(from, path, filled, depth, -1)
            for (let star = 0; star < stars; star++) out[SCATTERED] += this.firstScatterings(from, path, filled, depth, star)
          }
          depth += thickness
          transmission *= 1 - absorbed
        }
      }
    } while (!atStar && depth < OPAQUE && walk.cross() >= 0)
    if (!stokes) return
    stokes.finish(this.radial, out, withGroups)
    for (let star = 0; star < stars; star++) stokes.addRadial(beams![star].at, this.radials[star], out)
  }

  /**
   * Light scattered once between two points of the present cell, `filled` of which holds its dust, dimmed by `depth` and by the cell itself:
   * that of the point stars at the centre of spherical cells (-1), or of one star among cubes.
   */
  private firstScatterings(start: number, step: number, filled: number, depth: number, star: number): number {
    const { walk, medium } = this
    const { asymmetry, scattering, tables, beams } = medium.starlight!
    const { cells } = medium
    const { cell } = walk
    const chi = medium.extinction[cell] / filled
    const laws = asymmetry.length
    if (laws === 1 && scattering[cell] === 0) return 0
    const beam = star < 0 ? undefined : beams[star]
    // An observer at a place may look straight at a star or away from it.
    const least2 = (TINY * this.reach) ** 2
    let b2 = Math.max(walk.b2, least2)
    // Where the ray passes the star.
    let passes = 0
    let before = 0
    let rInner = 0
    let begin = start
    let end = start + step
    if (beam) {
      walk.trim(step)
      begin = walk.begin
      end = walk.end
      if (!(end > begin)) return 0
      const [x, y, z] = beam.at
      passes = x * walk.ux + y * walk.uy + z * walk.uz
      b2 = walk.b2 + x * x + y * y + z * z - 2 * (x * walk.x0 + y * walk.y0 + z * walk.z0) - passes * passes
      b2 = Math.max(b2, least2)
    } else {
      const { ir, it, ip, np, nr } = walk as SphericalWalk
      before = medium.starlight!.opticalDepth[(ir === 0 ? 0 : it * np + ip) * (nr + 1) + ir]
      rInner = sphericalOf(medium.walls).r[ir]
      if (before + depth > OPAQUE) return 0
    }
    const first = begin - passes
    const last = end - passes
    const length = end - begin
    const nearest2 = first < 0 && last > 0 ? b2 : b2 + Math.min(first * first, last * last)
    const steep = length * length > STEEP * STEEP * nearest2
    // Across a large part of the distance to the star the sum is over alpha, with s = b tan(alpha) and ds / r^2 = d(alpha) / b.
    const b = Math.sqrt(b2)
    const from = steep ? Math.atan2(first, b) : first
    const range = (steep ? Math.atan2(last, b) : last) - from
    const pieces = Math.min(
      MOST_PIECES,
      Math.ceil(Math.max(steep ? range / ANGLE_STEP : 1, (chi * length * walk.density(0.5 * (begin + end))) / DEPTH_STEP))
    )
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
      const lit = filled === 1 ? rInner : Math.max(rInner, this.rimAt(s, r))
      const fromStar = beam ? this.depthOnBeam(beam, s + passes, r2) : before + chi * (r > lit ? r - lit : 0)
      const passed = (s - first) * walk.density(0.5 * (begin + s + passes))
      const dimming = (walk.density(s + passes) * Math.exp(-fromStar - depth - chi * passed)) / (steep ? b : r2)
      sum += source * dimming
      radial += polarised * dimming
    }
    const luminosity = beam ? beam.luminosity : medium.starlight!.luminosity
    const scale = (luminosity / (4 * Math.PI)) * 0.5 * (width / filled)
    if (beam) this.radials[star] += radial * scale
    else this.radial += radial * scale
    return sum * scale
  }

  /** Where the line from the origin to the point at `s` of the ray, at radius r, meets the inner rim, cm. */
  private rimAt(s: number, r: number): number {
    const { x0, y0, ux, uy } = this.walk
    return (this.medium.rims!.inner * r) / Math.hypot(x0 + s * ux, y0 + s * uy)
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
    if (r2 < NEAR * NEAR * side * side || walk.atEdge())
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
