import { describe, expect, it } from 'vitest'
import { cellCube } from '../../src/grid/octree/octree.js'
import { OctreeBuilder } from '../../src/grid/octree/octree-builder.js'
import { stream } from '../../src/math/random.js'
import type { Vector } from '../../src/scene/types.js'
import { BEAM_POINT, type ColumnsRequest, fillColumns } from '../../src/solve/star-columns.js'

const PARSEC = 3e18

/** Cubes divided at random, with dust of two kinds, evenly, and a star at (0.3, -0.2, 0.1) of the side 1. */
function request(spheres: number[], opacity: number[]): ColumnsRequest {
  const builder = new OctreeBuilder([-0.5 * PARSEC, -0.5 * PARSEC, -0.5 * PARSEC], PARSEC)
  const uniform = stream('columns')
  for (let n = 0; n < 60; n++) {
    const node = Math.floor(builder.nodes * uniform())
    if (builder.child[node] === 0) builder.split(node)
  }
  const octree = builder.finish()
  const density = new Float64Array(2 * octree.cells).fill(1e-20, 0, octree.cells).fill(3e-20, octree.cells)
  const star = { at: [0.3 * PARSEC, -0.2 * PARSEC, 0.1 * PARSEC] as Vector, columns: new Float32Array(16 * octree.cells) }
  return { octree, density, opacity: Float64Array.from(opacity), spheres: Float64Array.from(spheres), stars: [star] }
}

/** Largest relative deviation of the columns from density x distance, over the points that `counts` holds for. */
function worstOf({ octree, stars: [{ at, columns }] }: ColumnsRequest, counts: (distance: number) => boolean): number {
  const cube = new Float64Array(4)
  let worst = 0
  for (let cell = 0; cell < octree.cells; cell++) {
    cellCube(octree, cell, cube)
    for (let k = 0; k < 8; k++) {
      const point = [0, 1, 2].map((a) => cube[a] + ((k >> a) & 1 ? 0.5 : -0.5) * BEAM_POINT * cube[3])
      const distance = Math.hypot(...point.map((value, a) => value - at[a]))
      if (!counts(distance)) continue
      for (const [c, density] of [1e-20, 3e-20].entries())
        worst = Math.max(worst, Math.abs(columns[(2 * cell + c) * 8 + k] / (density * distance) - 1))
    }
  }
  return worst
}

describe('fillColumns', () => {
  it('finds density times distance in even dust, whoever fills which cells', () => {
    const whole = request([], [10, 10])
    fillColumns(whole, 0, whole.octree.cells)
    expect(worstOf(whole, () => true)).toBeLessThan(1e-6)
    const shared = request([], [10, 10])
    for (let from = shared.octree.cells - 1; from >= 0; from--) fillColumns(shared, from, from + 1)
    expect(shared.stars[0].columns).toEqual(whole.stars[0].columns)
  })

  it('goes no farther than to where nothing is seen at any wavelength', () => {
    // Optical depth 100 is reached after 100 / (6000 x 1e-20 + 1000 x 3e-20) = 1.1e18 cm.
    const thick = request([], [6000, 1000])
    fillColumns(thick, 0, thick.octree.cells)
    expect(worstOf(thick, (distance) => distance < 1.1e18)).toBeLessThan(1e-6)
    expect(worstOf(thick, (distance) => distance > 1.3e18)).toBeGreaterThan(0.1)
    const { columns } = thick.stars[0]
    for (let i = 0; i < columns.length; i += 16)
      for (let k = 0; k < 8; k++) {
        const depth = 6000 * columns[i + k] + 1000 * columns[i + 8 + k]
        expect(depth).toBeLessThan(1000)
      }
  })

  it('is dark in any dust behind another star', () => {
    const [middle, radius] = [[0, -0.2 * PARSEC, 0.1 * PARSEC], 0.1 * PARSEC]
    const behind = request([...middle, radius ** 2], [10, 10])
    const { octree, stars } = behind
    fillColumns(behind, 0, octree.cells)
    const [{ at, columns }] = stars
    const cube = new Float64Array(4)
    let [hidden, wrong] = [0, 0]
    for (let i = 0; i < 8 * octree.cells; i++) {
      cellCube(octree, i >> 3, cube)
      const way = [0, 1, 2].map((a) => cube[a] + ((i >> a) & 1 ? 0.5 : -0.5) * BEAM_POINT * cube[3] - at[a])
      const offset = middle.map((value, a) => value - at[a])
      const along = way.reduce((sum, value, a) => sum + value * offset[a], 0) / way.reduce((sum, value) => sum + value * value, 0)
      const nearest = Math.hypot(...offset.map((value, a) => value - Math.min(1, Math.max(0, along)) * way[a]))
      // Inside the other star there is no dust.
      if (Math.hypot(...offset.map((value, a) => value - way[a])) < radius) continue
      const dark = columns[16 * (i >> 3) + (i & 7)] > 1e29
      if (dark) hidden++
      if (dark !== nearest < radius) wrong++
    }
    expect(hidden).toBeGreaterThan(3)
    expect(wrong).toBe(0)
  })
})
