import { expect, it } from 'vitest'
import { cellCount, type SphericalWalls } from '../../src/grid/geometry.js'
import { buriedCells } from '../../src/solve/buried-cells.js'

/** Nine shells of unit thickness about a core, and two sectors of polar angle. */
const walls: SphericalWalls = {
  r: Float64Array.from({ length: 11 }, (_, i) => i),
  cosTheta: Float64Array.of(1, 0, -1),
  phi: Float64Array.of(0, 2 * Math.PI)
}
const cells = cellCount(walls)
const shellOf = (cell: number) => (cell === 0 ? 0 : 1 + ((cell - 1) >> 1))

it('counts depths from where nothing conducts and from the outside, and buries no cell at a surface', () => {
  // Dust without a core: optical depth 100 a shell, but 1 in the two outermost.
  const extinction = Float64Array.from(
    { length: cells },
    (_, cell) => [0, 100, 100, 100, 100, 100, 100, 100, 1, 1][shellOf(cell)]
  )
  const { buried, depth } = buriedCells({ walls, cells }, extinction)
  // Paths of shells are area x int dr / (area at r): (r - r^2 / (r + 1/2)) etc., near one half.
  expect(depth[cells - 1]).toBeCloseTo(10 * (10 / 9.5 - 1), 6)
  expect(depth[1]).toBeCloseTo(100 * (1 - 1 / 1.5), 6)
  expect(buried.map(shellOf)).toEqual([2, 2, 3, 3, 4, 4, 5, 5, 6, 6, 7, 7])
})

it('buries nothing in thin dust, and all but the outermost cells of a thick ball', () => {
  expect(buriedCells({ walls, cells }, new Float64Array(cells).fill(0.01)).buried).toEqual([])
  expect(buriedCells({ walls, cells }, new Float64Array(cells).fill(50)).buried).toHaveLength(cells - 2)
})
