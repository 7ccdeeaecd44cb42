import { describe, expect, it } from 'vitest'
import {
  CHILD,
  cellCube,
  cubeVolumes,
  LEVELS,
  NEIGHBOUR,
  type Octree,
  OUTSIDE,
  RECORD,
  SIZE
} from '../../../src/grid/octree/octree.js'
import { OctreeBuilder } from '../../../src/grid/octree/octree-builder.js'
import { OctreeWalk } from '../../../src/grid/octree/octree-walk.js'
import { stream } from '../../../src/math/random.js'

/** An octree divided about random points down to a depth, with cells of every level side by side. */
function randomOctree(depth: number, seed: string, origin: [number, number, number] = [-0.9, -1.1, -1.05], side = 2): Octree {
  const uniform = stream(`octree/${seed}/${depth}`)
  const builder = new OctreeBuilder(origin, side)
  for (let n = 0; n < 40 * depth; n++) {
    let node = 0
    const deepest = depth * Math.sqrt(uniform())
    for (let level = 0; level < deepest; level++) {
      const first = builder.child[node] > 0 ? builder.child[node] : builder.split(node)
      node = first + Math.floor(8 * uniform())
    }
  }
  return builder.finish()
}

function direction(uniform: () => number): [number, number, number] {
  const mu = 2 * uniform() - 1
  const sin = Math.sqrt(1 - mu * mu)
  const azimuth = 2 * Math.PI * uniform()
  return [sin * Math.cos(azimuth), sin * Math.sin(azimuth), mu]
}

/** Directions of every kind: any, along axes and diagonals, and very nearly along a wall. */
function anyDirection(n: number, uniform: () => number): [number, number, number] {
  const u = direction(uniform)
  if (n % 10 === 8) for (const a of [0, 1, 2]) u[a] = Math.round(3 * (uniform() - 0.5))
  if (n % 10 === 9) u[Math.floor(3 * uniform())] *= 1e-12
  const norm = Math.hypot(...u)
  return norm > 0 ? (u.map((component) => component / norm) as [number, number, number]) : [0, 0, 1]
}

/** The cell of a point, found by looking through all of them. */
function brute(octree: Octree, point: number[]): number {
  const cube = new Float64Array(4)
  for (let cell = 0; cell < octree.cells; cell++) {
    cellCube(octree, cell, cube)
    if (point.every((value, a) => value >= cube[a] - 0.5 * cube[3] && value < cube[a] + 0.5 * cube[3])) return cell
  }
  return -1
}

/** Length of a line within the cube, from the planes of its sides. */
function chordOf({ origin, side }: Octree, p: number[], u: number[]): number {
  let [first, last] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY]
  for (let a = 0; a < 3; a++) {
    const [low, high] = [(origin[a] - p[a]) / u[a], (origin[a] + side - p[a]) / u[a]]
    if (u[a] === 0) {
      if (p[a] < origin[a] || p[a] >= origin[a] + side) return 0
    } else {
      first = Math.max(first, Math.min(low, high))
      last = Math.min(last, Math.max(low, high))
    }
  }
  return Math.max(0, last - first)
}

describe('OctreeWalk', () => {
  const RAYS = 1_000_000
  it('loses none of a million random rays through octrees of depth 3 to 12, and measures their chords to 1e-10', () => {
    let [sent, entered, misplaced, backward, checked] = [0, 0, 0, 0, 0]
    let worst = 0
    for (let depth = 3; depth <= 12; depth++) {
      const octree = randomOctree(depth, 'rays')
      const walk = new OctreeWalk(octree)
      const locator = new OctreeWalk(octree)
      const uniform = stream(`rays/${depth}`)
      for (let n = 0; n < RAYS / 10; n++) {
        sent++
        const [ux, uy, uz] = anyDirection(n, uniform)
        // A point in or about the cube, brought to the closest approach to the origin.
        const point = [0, 1, 2].map((a) => octree.origin[a] + octree.side * (1.2 * uniform() - 0.1))
        const along = point[0] * ux + point[1] * uy + point[2] * uz
        const [x0, y0, z0] = [point[0] - along * ux, point[1] - along * uy, point[2] - along * uz]
        const chord = chordOf(octree, [x0, y0, z0], [ux, uy, uz])
        if (!walk.enter(x0, y0, z0, ux, uy, uz)) {
          if (chord > 1e-12) worst = Number.POSITIVE_INFINITY
          continue
        }
        entered++
        let path = 0
        let steps = 0
        do {
          const step = walk.toWall()
          if (!(step >= 0)) backward++
          if (step > 1e-9 && n % 16 === 0) {
            const s = walk.s + 0.5 * step
            locator.startAt(x0 + s * ux, y0 + s * uy, z0 + s * uz, ux, uy, uz)
            checked++
            if (locator.cell !== walk.cell) misplaced++
          }
          path += step
          if (++steps > 100_000) throw new Error('a ray is trapped')
        } while (walk.cross() >= 0)
        if (chord > 1e-6) worst = Math.max(worst, Math.abs(path - chord) / chord)
        else if (Math.abs(path - chord) > 1e-14) worst = Number.POSITIVE_INFINITY
      }
    }
    expect(sent).toBe(RAYS)
    expect(entered).toBeGreaterThan(0.8 * RAYS)
    expect(backward).toBe(0)
    expect(worst).toBeLessThan(1e-10)
    expect(checked).toBeGreaterThan(500_000)
    expect(misplaced).toBe(0)
  })

  it('locates points as a search through all cells does', () => {
    const octree = randomOctree(7, 'locate')
    const walk = new OctreeWalk(octree)
    const uniform = stream('locate')
    for (let n = 0; n < 500; n++) {
      const point = [0, 1, 2].map((a) => octree.origin[a] + octree.side * uniform())
      walk.startAt(point[0], point[1], point[2], 0, 0, 1)
      expect(walk.cell).toBe(brute(octree, point))
    }
  })

  it('stays in the cell where it scatters on a wall', () => {
    const octree = randomOctree(9, 'scatter')
    const walk = new OctreeWalk(octree)
    const uniform = stream('scatter')
    const cube = new Float64Array(4)
    let [backward, outside] = [0, 0]
    for (let n = 0; n < 50_000; n++) {
      walk.startAt(0.01, 0.02, 0.03, ...direction(uniform))
      for (let event = 0; event < 20; event++) {
        const step = walk.toWall()
        // One turn in three happens exactly at a wall, where rounding puts the point on either side.
        const s = walk.s + step * (event % 3 === 0 ? 1 : uniform())
        walk.turn(walk.x0 + s * walk.ux, walk.y0 + s * walk.uy, walk.z0 + s * walk.uz, ...direction(uniform))
        if (walk.toWall() < 0) backward++
        if (walk.cross() < 0) break
        cellCube(octree, walk.cell, cube)
        const farthest = Math.max(Math.abs(walk.x - cube[0]), Math.abs(walk.y - cube[1]), Math.abs(walk.z - cube[2]))
        if (farthest > 0.5 * cube[3] + 1e-12) outside++
      }
    }
    expect(backward).toBe(0)
    expect(outside).toBe(0)
  })

  it('starts in a given cell and knows how far its walls are', () => {
    const octree = randomOctree(6, 'clearance', [10, 20, 30], 8)
    const walk = new OctreeWalk(octree)
    const cube = new Float64Array(4)
    for (let cell = 0; cell < octree.cells; cell++) {
      const [x, y, z, length] = cellCube(octree, cell, cube)
      walk.startIn(x, y, z + 0.3 * length, 1, 0, 0, cell)
      expect(walk.cell).toBe(cell)
      expect(walk.clearance(x, y, z + 0.3 * length) / length).toBeCloseTo(0.2, 9)
      expect(walk.toWall() / length).toBeCloseTo(0.5, 9)
    }
  })
})

describe('Octree', () => {
  it('fills the cube, with neighbours that share a wall', () => {
    const octree = randomOctree(8, 'neighbours')
    const { families, records, corners, cells, places, side } = octree
    const volume = cubeVolumes(octree, new Float64Array(cells)).reduce((sum, value) => sum + value, 0)
    expect(volume / side ** 3).toBeCloseTo(1, 12)
    expect(cells).toBe(7 * families + 1)
    const sizeOf = (family: number) => records[RECORD * family + SIZE]
    const withinOf = (place: number) => records[RECORD * (place >> 3) + CHILD + (place & 7)]
    const cornerOf = (place: number, a: number) => corners[3 * (place >> 3) + a] + ((place >> a) & 1) * sizeOf(place >> 3)
    let faults = 0
    const require = (truth: boolean) => {
      if (!truth) faults++
    }
    for (let family = 0; family < families; family++) {
      const size = 2 * sizeOf(family)
      for (let k = 0; k < 8; k++) {
        const place = 8 * family + k
        const within = withinOf(place)
        if (within < 0) require(places[-1 - within] === place)
        else require(2 * sizeOf(within) === size / 2 && [0, 1, 2].every((a) => corners[3 * within + a] === cornerOf(place, a)))
      }
      for (let face = 0; face < 6; face++) {
        const a = face >> 1
        const upper = face % 2 === 1
        const wall = corners[3 * family + a] + (upper ? size : 0)
        const beyond = records[RECORD * family + NEIGHBOUR + face]
        if (beyond === OUTSIDE) {
          require(wall === (upper ? 2 ** LEVELS : 0))
          continue
        }
        // A family of the same size, or a cell.
        const place = -2 - beyond
        const theirs = beyond >= 0 ? 2 * sizeOf(beyond) : sizeOf(place >> 3)
        const corner = [0, 1, 2].map((b) => (beyond >= 0 ? corners[3 * beyond + b] : cornerOf(place, b)))
        require(beyond >= 0 ? theirs === size : theirs >= size && withinOf(place) < 0)
        require(corner[a] + (upper ? 0 : theirs) === wall)
        for (const b of [0, 1, 2]) {
          if (b === a) continue
          require(corners[3 * family + b] >= corner[b])
          require(corners[3 * family + b] + size <= corner[b] + theirs)
        }
      }
    }
    expect(faults).toBe(0)
  })

  it('divides the whole cube at least once', () => {
    const octree = new OctreeBuilder([0, 0, 0], 1).finish()
    expect(octree.cells).toBe(8)
    const walk = new OctreeWalk(octree)
    walk.startAt(0.1, 0.2, 0.3, 1, 0, 0)
    expect([walk.cell, walk.toWall(), walk.cross(), walk.toWall(), walk.cross()]).toEqual([0, 0.4, 1, 0.5, -1])
  })
})
