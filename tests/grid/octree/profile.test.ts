import { describe, expect, it } from 'vitest'
import { drawInCell } from '../../../src/grid/cells.js'
import type { Octree } from '../../../src/grid/octree/octree.js'
import { OctreeBuilder } from '../../../src/grid/octree/octree-builder.js'
import { OctreeWalk } from '../../../src/grid/octree/octree-walk.js'
import { CUT, cutProfile, densityIn, slopeProfile } from '../../../src/grid/octree/profile.js'
import { stream } from '../../../src/math/random.js'

const uniform = stream('profiles')
const between = (low: number, high: number) => low + (high - low) * uniform()

/** A cube of side 8 about the origin in eight cells of side 4: four with slopes, four cut by planes. */
function octree(): Octree {
  const made = new OctreeBuilder([-4, -4, -4], 8).finish()
  const cuts: number[] = []
  for (let cell = 0; cell < 8; cell++) {
    if (cell % 2 === 0) {
      made.profiles[cell] = slopeProfile(between(-0.6, 0.6), between(-0.6, 0.6), between(-0.6, 0.6))
      continue
    }
    const n = [between(-1, 1), between(-1, 1), between(-1, 1)]
    const length = Math.hypot(...n)
    made.profiles[cell] = cutProfile(cuts.length / CUT)
    cuts.push(...n.map((value) => value / length), between(-0.3, 0.3), between(1.2, 2), between(-0.8, 0.8), 0.3, -0.3)
  }
  made.cuts = Float32Array.from(cuts)
  return made
}

const made = octree()
/** By definition, cm from the middle of the whole cube. */
function densityAt(cell: number, point: number[]): number {
  const [x, y, z] = point.map((value, a) => (value - (((made.places[cell] >> a) & 1) === 1 ? 2 : -2)) / 4)
  return densityIn(made.profiles[cell], made.cuts, x, y, z)
}

function randomWalk(): OctreeWalk {
  const walk = new OctreeWalk(made)
  const cosine = between(-1, 1)
  const azimuth = between(0, 2 * Math.PI)
  const sine = Math.sqrt(1 - cosine * cosine)
  walk.startAt(between(-4, 4), between(-4, 4), between(-4, 4), sine * Math.cos(azimuth), sine * Math.sin(azimuth), cosine)
  return walk
}
const pointAt = (walk: OctreeWalk, s: number) => [walk.x0 + s * walk.ux, walk.y0 + s * walk.uy, walk.z0 + s * walk.uz]

describe('density that varies within cells', () => {
  it('weighs steps as a sum over many points does, and finds the step to a weight', () => {
    let cut = 0
    for (let n = 0; n < 400; n++) {
      const walk = randomWalk()
      const step = walk.toWall()
      const parts = 2000
      let sum = 0
      for (let k = 0; k < parts; k++) sum += densityAt(walk.cell, pointAt(walk, walk.s + ((k + 0.5) * step) / parts)) / parts
      const weighed = walk.weighed(step)
      // A part of the sum is on the edge.
      expect(Math.abs(weighed - sum * step)).toBeLessThan((4 * step) / parts)
      if (!(weighed > 1e-3)) continue
      if (walk.atEdge()) cut++
      const share = uniform()
      const to = walk.stepOf(share * weighed)
      expect(to).toBeLessThanOrEqual(step)
      expect(walk.weighed(to) / weighed).toBeCloseTo(share, 6)
    }
    expect(cut).toBeGreaterThan(50)
  })

  it('is where points are drawn', () => {
    const point = new Float64Array(3)
    const draws = 4000
    for (let cell = 0; cell < 8; cell++) {
      const half = [0, 0, 0]
      let behind = 0
      for (let n = 0; n < draws; n++) {
        drawInCell(made, cell, uniform, point)
        if (densityAt(cell, Array.from(point)) === 0) behind++
        for (let a = 0; a < 3; a++) if (Math.abs(point[a]) > 2) half[a]++
      }
      expect(behind).toBe(0)
      // By the integral over a lattice: the share of each outer half.
      const expected = [0, 0, 0]
      let whole = 0
      for (let k = 0; k < 40 ** 3; k++) {
        const p = [k % 40, Math.floor(k / 40) % 40, Math.floor(k / 1600)].map(
          (digit, a) => ((digit + 0.5) / 10) * (((made.places[cell] >> a) & 1) === 1 ? 1 : -1)
        )
        const density = densityAt(cell, p)
        whole += density
        for (let a = 0; a < 3; a++) if (Math.abs(p[a]) > 2) expected[a] += density
      }
      // 4.5 sigma of the count, one of 24 by chance in 6000, and the lattice.
      for (let a = 0; a < 3; a++)
        expect(Math.abs(half[a] / draws - expected[a] / whole)).toBeLessThan(4.5 * Math.sqrt(0.25 / draws) + 0.01)
    }
  })
})
