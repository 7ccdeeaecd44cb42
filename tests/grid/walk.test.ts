import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { cellCount, cellVolumes, type SphericalWalls } from '../../src/grid/geometry.js'
import { SphericalWalk } from '../../src/grid/walk.js'
import { stream } from '../../src/math/random.js'

/** Walls that differ much in size, with a midplane wall where `polar` is even. */
function walls(radial: number, polar: number, azimuthal: number, ratio: number): SphericalWalls {
  return {
    r: Float64Array.from({ length: radial + 1 }, (_, i) => (i === 0 ? 0 : ratio ** ((i - 1) / (radial - 1)))),
    cosTheta: Float64Array.from({ length: polar + 1 }, (_, j) =>
      j === 0 ? 1 : j === polar ? -1 : 2 * j === polar ? 0 : Math.cos((Math.PI * j) / polar)
    ),
    phi: Float64Array.from({ length: azimuthal + 1 }, (_, k) => (2 * Math.PI * k) / azimuthal)
  }
}

function direction(uniform: () => number): [number, number, number] {
  const mu = 2 * uniform() - 1
  const sin = Math.sqrt(1 - mu * mu)
  const azimuth = 2 * Math.PI * uniform()
  return [sin * Math.cos(azimuth), sin * Math.sin(azimuth), mu]
}

/** Sends rays from outside; returns the largest relative error of the summed path and the number of misplaced midpoints. */
function throwRays(grid: SphericalWalls, rays: number, seed: string) {
  const uniform = stream(seed)
  const walk = new SphericalWalk(grid)
  const nr = grid.r.length - 1
  const outer = grid.r[nr]
  let worst = 0
  let misplaced = 0
  let longest = 0
  for (let n = 0; n < rays; n++) {
    const [ux, uy, uz] = direction(uniform)
    const [vx, vy, vz] = direction(uniform)
    const along = vx * ux + vy * uy + vz * uz
    let [px, py, pz] = [vx - along * ux, vy - along * uy, vz - along * uz]
    const norm = Math.hypot(px, py, pz)
    // Half of the rays aim at small radii, evenly in the logarithm.
    const b = n % 2 ? outer * Math.sqrt(uniform()) : outer * (grid.r[1] / outer / 3) ** uniform()
    px *= b / norm
    py *= b / norm
    pz *= b / norm
    if (!walk.enter(px, py, pz, ux, uy, uz)) continue
    let path = 0
    let steps = 0
    do {
      const cell = walk.cell
      const step = walk.toWall()
      if (n % 64 === 0 && step > 1e-9 * outer) {
        const s = walk.s + step / 2
        const [x, y, z] = [walk.x0 + s * ux, walk.y0 + s * uy, walk.z0 + s * uz]
        if (brute(grid, x, y, z) !== cell) misplaced++
      }
      path += step
      if (++steps > 10_000) throw new Error('a ray is trapped')
    } while (walk.cross() >= 0)
    longest = Math.max(longest, steps)
    const chord = 2 * Math.sqrt(outer * outer - px * px - py * py - pz * pz)
    worst = Math.max(worst, Math.abs(path - chord) / chord)
  }
  return { worst, misplaced, longest }
}

/** The cell of a point, found by looking through every wall. */
function brute(grid: SphericalWalls, x: number, y: number, z: number): number {
  const radius = Math.hypot(x, y, z)
  const ir = grid.r.findLastIndex((wall) => wall <= radius)
  if (ir === 0) return 0
  const it = Math.min(
    grid.cosTheta.findLastIndex((wall) => wall >= z / radius),
    grid.cosTheta.length - 2
  )
  const azimuth = (Math.atan2(y, x) + 2 * Math.PI) % (2 * Math.PI)
  const ip = Math.min(
    grid.phi.findLastIndex((wall) => wall <= azimuth),
    grid.phi.length - 2
  )
  return 1 + ((ir - 1) * (grid.cosTheta.length - 1) + it) * (grid.phi.length - 1) + ip
}

describe('SphericalWalk', () => {
  const kinds: [string, SphericalWalls][] = [
    ['1-D', walls(60, 1, 1, 1e3)],
    ['2-D', walls(40, 30, 1, 1e3)],
    ['2-D with an odd number of polar cells', walls(20, 7, 1, 30)],
    ['3-D', walls(25, 16, 12, 1e4)]
  ]
  for (const [name, grid] of kinds) {
    it(`loses none of a million random rays: ${name}`, () => {
      const { worst, misplaced, longest } = throwRays(grid, 1_000_000, `rays/${name}`)
      expect(worst).toBeLessThan(1e-10)
      expect(misplaced).toBe(0)
      expect(longest).toBeGreaterThan(30)
    })
  }

  it('finds the cells of rays along the axis, and of rays in planes with it', () => {
    for (const [, grid] of kinds) {
      const walk = new SphericalWalk(grid)
      const outer = grid.r[grid.r.length - 1]
      const uniform = stream('axis')
      let [misplaced, steps, worst] = [0, 0, 0]
      for (let n = 0; n < 300; n++) {
        // Down the axis, up it, and along x: without rounding, a component of place and direction is 0.
        const [ux, uz] = n % 3 === 2 ? [1, 0] : [0, n % 3 ? 1 : -1]
        const b = outer * (grid.r[1] / outer) ** uniform()
        const azimuth = 2 * Math.PI * uniform()
        const start = [ux ? 0 : b * Math.cos(azimuth), b * Math.sin(azimuth), ux ? b * Math.cos(azimuth) : 0]
        walk.enter(start[0], start[1], start[2], ux, 0, uz)
        let path = 0
        do {
          const cell = walk.cell
          const step = walk.toWall()
          path += step
          if (step < 1e-9 * outer) continue
          const s = walk.s + 0.5 * step
          if (brute(grid, start[0] + s * ux, start[1], start[2] + s * uz) !== cell) misplaced++
          steps++
        } while (walk.cross() >= 0)
        worst = Math.max(worst, Math.abs(path / (2 * Math.sqrt(outer * outer - b * b)) - 1))
      }
      expect(misplaced).toBe(0)
      expect(steps).toBeGreaterThan(1000)
      expect(worst).toBeLessThan(1e-10)
    }
  })

  it('begins in the right cell on the axis, in the midplane, on walls and at the origin', () => {
    for (const [name, grid] of kinds) {
      const walk = new SphericalWalk(grid)
      const outer = grid.r[grid.r.length - 1]
      const uniform = stream('starts')
      let [misplaced, steps] = [0, 0]
      for (let n = 0; n < 2000; n++) {
        const wall = grid.r[Math.floor(uniform() * (grid.r.length - 1))]
        const radius = n % 2 ? wall : outer * uniform()
        const azimuth = grid.phi[Math.floor(uniform() * (grid.phi.length - 1))]
        // On the axis, on a wall of azimuth in the midplane, along y, anywhere on a radial wall.
        const start = [
          [0, 0, n % 8 < 4 ? radius : -radius],
          [radius * Math.cos(azimuth), radius * Math.sin(azimuth), 0],
          [0, radius, 0],
          direction(uniform).map((component) => component * radius)
        ][n % 4]
        // Some rays lie in the midplane or in a plane with the axis.
        const [vx, vy, vz] = direction(uniform)
        const u = n % 5 === 0 ? [vx, vy, 0] : n % 5 === 1 ? [vx, 0, vz] : [vx, vy, vz]
        const norm = Math.hypot(...u)
        const [ux, uy, uz] = u.map((component) => component / norm)
        walk.startAt(start[0], start[1], start[2], ux, uy, uz)
        let path = 0
        do {
          const cell = walk.cell
          const step = walk.toWall()
          path += step
          const s = walk.s + 0.5 * step
          const middle = [walk.x0 + s * ux, walk.y0 + s * uy, walk.z0 + s * uz]
          // What runs in a wall is in either cell.
          const inWall = Math.abs(middle[2]) < 1e-9 * outer || Math.abs(middle[1]) < 1e-9 * outer
          if (step < 1e-9 * outer || inWall) continue
          if (brute(grid, middle[0], middle[1], middle[2]) !== cell) misplaced++
          steps++
        } while (walk.cross() >= 0)
        const along = start[0] * ux + start[1] * uy + start[2] * uz
        const b2 = start.reduce((sum, component) => sum + component * component, 0) - along * along
        expect(Math.abs(path - (Math.sqrt(outer * outer - b2) - along)), name).toBeLessThan(1e-9 * outer)
      }
      expect(misplaced, name).toBe(0)
      expect(steps).toBeGreaterThan(1000)
    }
  })

  it('sums cell volumes to the sphere', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 30 }),
        fc.integer({ min: 1, max: 20 }),
        fc.integer({ min: 1, max: 9 }),
        (nr, nt, np) => {
          const grid = walls(nr, nt, np, 100)
          const volume = cellVolumes(grid, new Float64Array(cellCount(grid)))
          const total = volume.reduce((sum, value) => sum + value, 0)
          expect(total / ((4 / 3) * Math.PI * 1e6)).toBeCloseTo(1, 10)
        }
      )
    )
  })

  it('stays in the cell where it scatters on a wall', () => {
    const grid = walls(20, 8, 6, 100)
    const walk = new SphericalWalk(grid)
    const uniform = stream('scatter')
    let backward = 0
    let outside = 0
    for (let n = 0; n < 200_000; n++) {
      const [ux, uy, uz] = direction(uniform)
      walk.startAt(0, 0, 0, ux, uy, uz)
      for (let event = 0; event < 20; event++) {
        const step = walk.toWall()
        // One turn in three happens exactly at a wall, where rounding puts the point on either side.
        const s = walk.s + step * (event % 3 === 0 ? 1 : uniform())
        const [vx, vy, vz] = direction(uniform)
        walk.turn(walk.x0 + s * walk.ux, walk.y0 + s * walk.uy, walk.z0 + s * walk.uz, vx, vy, vz)
        if (walk.toWall() < 0) backward++
        if (walk.cross() < 0) break
        const radius = Math.hypot(walk.x, walk.y, walk.z)
        if (radius < grid.r[walk.ir] * (1 - 1e-9) || radius > grid.r[walk.ir + 1] * (1 + 1e-9)) outside++
      }
    }
    expect(backward).toBe(0)
    expect(outside).toBe(0)
  })
})
