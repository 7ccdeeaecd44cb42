import { describe, expect, it } from 'vitest'
import { growOctree, type OctreeRequest } from '../../src/grid/octree/grow-octree.js'
import { CHILD, cellCube, cubeVolumes, LEVELS, type Octree, RECORD, SIZE } from '../../src/grid/octree/octree.js'
import { OctreeWalk } from '../../src/grid/octree/octree-walk.js'
import { stream } from '../../src/math/random.js'
import { octreeDensities } from '../../src/model/octree-density.js'
import type { DensityCube, DensityPoints, DustSpec, ShapeSpec } from '../../src/scene/types.js'
import { makeShape } from '../../src/shapes/make-shape.js'

function grown(spec: ShapeSpec, more: Pick<DustSpec, 'carve' | 'clumps'>, tau: number, request: Partial<OctreeRequest> = {}) {
  const shape = makeShape(spec, more)
  const scale =
    tau / (shape.column > 0 && Number.isFinite(shape.column) ? shape.column : shape.totalMass / shape.outerRadius ** 2)
  const layers = [{ shape, scale, extinction: 1 }]
  return {
    shape,
    scale,
    octree: growOctree({ layers, stars: [[0, 0, 0]], width: 0, finest: 20, cellsAtMost: 30_000, tolerance: 0, ...request })
  }
}

const disk: ShapeSpec = {
  kind: 'disk',
  inner: 1,
  outer: 300,
  surfaceSlope: -1,
  scaleHeight: { value: 10, at: 100, flaring: 1.25 }
}
const ball: ShapeSpec = { kind: 'ball', radius: 10, at: [20, 5, 3] }
const wind: ShapeSpec = { kind: 'shell', inner: 6, outer: 3000, slope: -2 }

/** A field of smooth lumps, and points as a simulation leaves them. */
const cube: DensityCube = {
  kind: 'cube',
  file: '',
  size: [12, 12, 12],
  values: Float64Array.from({ length: 12 ** 3 }, (_, i) => 1.2 + Math.sin(i % 12) * Math.cos(Math.floor(i / 12) % 12))
}
const uniform = stream('cloud')
const column = (value: () => number) => Float64Array.from({ length: 60 }, value)
const cloud: DensityPoints = {
  kind: 'points',
  file: '',
  x: column(() => 100 * (2 * uniform() - 1)),
  y: column(() => 100 * (2 * uniform() - 1)),
  z: column(() => 100 * (2 * uniform() - 1)),
  smoothingLength: column(() => 10 + 10 * uniform()),
  mass: column(uniform)
}

describe('growOctree and octreeDensities', () => {
  it.each([
    ['shell', wind, {}],
    ['ball elsewhere', ball, {}],
    ['tilted disk', { ...disk, tilt: { angle: 0.3, toward: 1 } }, {}],
    ['eccentric ring', { kind: 'ring', radius: 100, width: 5, scaleHeight: 4, eccentricity: 0.3, periapsis: 1 }, {}],
    ['slab', { kind: 'slab', thickness: 60, width: 200, at: [0, 0, 0], tilt: { angle: 0.5, toward: 0 } }, {}],
    [
      'infall with a cavity',
      { kind: 'infall', inner: 1, outer: 1000, centrifugalRadius: 50 },
      { carve: [{ kind: 'cavity', halfAngle: 0.4, remaining: 0 }] }
    ],
    [
      'disk with a gap, tilted',
      { ...disk, tilt: { angle: 0.3, toward: 1 } },
      { carve: [{ kind: 'gap', from: 20, to: 30, remaining: 0.1 }] }
    ],
    [
      'ring with a gap',
      { kind: 'ring', radius: 100, width: 15, scaleHeight: 9, eccentricity: 0, periapsis: 0 },
      { carve: [{ kind: 'gap', from: 95, to: 105, remaining: 0 }] }
    ],
    ['ball elsewhere with a cavity', ball, { carve: [{ kind: 'cavity', halfAngle: 0.5, remaining: 0.2 }] }],
    [
      'slab elsewhere of clumps',
      { kind: 'slab', thickness: 60, width: 200, at: [30, 0, 0] },
      { clumps: { count: 20, radius: 15, contrast: 10, seed: 'a' } }
    ],
    ['imported cube', { kind: 'field', width: 300, at: [10, 5, 0], data: cube }, {}],
    ['imported cloud of points', { kind: 'field', width: 300, at: [0, 0, 0], data: cloud }, {}]
  ] as [string, ShapeSpec, Pick<DustSpec, 'carve' | 'clumps'>][])(
    'hold the mass of a %s to 1e-3, before any correction',
    (_, spec, more) => {
      const { octree, shape, scale } = grown(spec, more, 10)
      const { density, massRatio } = octreeDensities(octree, shape, scale)
      expect(Math.abs(massRatio - 1)).toBeLessThan(1e-3)
      const volume = cubeVolumes(octree, new Float64Array(octree.cells))
      const mass = density.reduce((sum, value, i) => sum + value * volume[i], 0)
      expect(mass / (scale * shape.totalMass)).toBeCloseTo(1, 10)
    }
  )

  it('finds clumps far smaller than the first cells', () => {
    const clumps = { count: 30, radius: 2, contrast: 1000, seed: 'a' }
    const { octree, shape } = grown({ kind: 'ball', radius: 100, at: [0, 0, 0] }, { clumps }, 1)
    const walk = new OctreeWalk(octree)
    const cube = new Float64Array(4)
    const { x, y, z } = shape.details
    for (let i = 0; i < x.length; i++) {
      walk.startAt(x[i], y[i], z[i], 0, 0, 1)
      expect(cellCube(octree, walk.cell, cube)[3]).toBeLessThan(4)
    }
    expect(Math.abs(octreeDensities(octree, shape, 1).massRatio - 1)).toBeLessThan(0.01)
  })

  it('divides near the star and where the dust is, and leaves empty space whole', () => {
    const { octree } = grown(wind, {}, 5)
    const walk = new OctreeWalk(octree)
    const cube = new Float64Array(4)
    const lengthAt = (x: number, y: number, z: number) => {
      walk.startAt(x, y, z, 0, 0, 1)
      return cellCube(octree, walk.cell, cube)[3]
    }
    for (const r of [7, 30, 300, 2000]) expect(lengthAt(0.6 * r, 0.64 * r, 0.48 * r) / r).toBeLessThan(0.4)
    // Only cubes that hold some of the ball are ever divided.
    expect(farthestDivided(grown(ball, {}, 5, { width: 400 }).octree)).toBe(0)
  })

  it('keeps to the number of cells and to the level allowed, and comes out the same again', () => {
    for (const cellsAtMost of [8, 1000, 33_333]) {
      const { octree } = grown(disk, {}, 100, { cellsAtMost })
      expect(octree.cells).toBeLessThanOrEqual(cellsAtMost)
      expect(octree.cells).toBeGreaterThan(cellsAtMost - 8)
      expect(grown(disk, {}, 100, { cellsAtMost }).octree.records).toEqual(octree.records)
    }
    const shallow = grown(disk, {}, 100, { finest: 4 }).octree
    const volumes = cubeVolumes(shallow, new Float64Array(shallow.cells))
    expect(Math.min(...volumes) / shallow.side ** 3).toBeCloseTo(2 ** -12, 12)
    expect(grown(disk, {}, 100, { width: 50 }).octree).toMatchObject({ side: 50 })
    // What is good enough ends it before the number is reached; half of that takes 2^1.5 times the cells.
    const [coarse, fine] = [0.04, 0.02].map((tolerance) => grown(wind, {}, 1, { cellsAtMost: 1_000_000, tolerance }).octree)
    expect(coarse.error).toBeLessThan(0.04)
    expect(fine.cells).toBeLessThan(200_000)
    expect(fine.cells / coarse.cells).toBeGreaterThan(2)
    expect(fine.cells / coarse.cells).toBeLessThan(4)
  })
})

/** Farthest that a cube whose children are cells lies from the ball about (20, 5, 3), in radii of the ball beyond its surface. */
function farthestDivided({ origin, side, families, records, corners }: Octree): number {
  const unit = side / 2 ** LEVELS
  let farthest = 0
  for (let family = 0; family < families; family++) {
    if (records.subarray(RECORD * family + CHILD, RECORD * family + CHILD + 8).every((child) => child >= 0)) continue
    const size = 2 * records[RECORD * family + SIZE]
    let distance2 = 0
    for (const [a, centre] of [20, 5, 3].entries()) {
      const low = origin[a] + corners[3 * family + a] * unit
      distance2 += Math.max(0, low - centre, centre - low - size * unit) ** 2
    }
    farthest = Math.max(farthest, Math.sqrt(distance2) / 10 - 1)
  }
  return farthest
}
