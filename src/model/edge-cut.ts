import { Matrix, solve } from 'ml-matrix'
import { CUT } from '../grid/octree/profile.js'

/** Times that the plane is turned. */
const TURNS = 5
/** How far for a difference of centres: a plane across the middle of a cube is turned by 12 times that of its halves. */
const TURN = 8
/** Of all points as many may lie on the wrong side of the plane, and of those with dust this share. */
const WRONG = 0.03
const WRONG_OF_DUST = 0.2
/** Points with dust for a change of density to be found among them. */
const ENOUGH = 12

/** Finds the plane behind which the dust of a cell lies, and how its density changes there. */
export class EdgeCut {
  /** n, d, a, g of the last fit: see profile.ts. */
  readonly cut = new Float64Array(CUT)
  private readonly values: Float64Array
  private readonly heights: Float64Array
  private readonly sorted: Float64Array

  /** `points`: evenly spread in a cube of side 1 about the origin, three numbers each. */
  constructor(readonly points: Float64Array) {
    this.values = new Float64Array(points.length / 3)
    this.heights = new Float64Array(points.length / 3)
    this.sorted = new Float64Array(points.length / 3)
  }

  /** Takes the density at every point; false where no plane tells where dust is. */
  fit(density: (k: number) => number): boolean {
    const { values, heights, points } = this
    let dusty = 0
    for (let k = 0; k < values.length; k++) {
      values[k] = density(k)
      if (values[k] > 0) dusty++
    }
    if (dusty === 0 || dusty === values.length) return false
    const centre = this.centre((k) => values[k] > 0)
    // The plane with as much dust behind it whose centre is the same.
    let n = unit(centre)
    for (let turn = 0; turn < TURNS; turn++) {
      const d = this.place(n, dusty)
      const own = this.centre((k) => heights[k] > d)
      const share = dusty / values.length
      n = unit(n.map((value, a) => value + TURN * share * (centre[a] - own[a])))
    }
    const d = this.place(n, dusty)
    let wrong = 0
    for (let k = 0; k < values.length; k++) if (heights[k] > d !== values[k] > 0) wrong++
    if (wrong > WRONG * values.length || wrong > WRONG_OF_DUST * dusty) return false
    this.cut.set([...n, d, ...this.change(points, d, dusty)])
    return true
  }

  /** Heights of all points along n; returns that above which so many lie. */
  private place(n: number[], count: number): number {
    const { heights, sorted, points } = this
    for (let k = 0; k < heights.length; k++)
      heights[k] = n[0] * points[3 * k] + n[1] * points[3 * k + 1] + n[2] * points[3 * k + 2]
    sorted.set(heights)
    sorted.sort()
    const above = sorted.length - count
    return 0.5 * (sorted[above - 1] + sorted[above])
  }

  private centre(counts: (k: number) => boolean): number[] {
    const { points, values } = this
    const sum = [0, 0, 0]
    let count = 0
    for (let k = 0; k < values.length; k++) {
      if (!counts(k)) continue
      count++
      for (let a = 0; a < 3; a++) sum[a] += points[3 * k + a]
    }
    return sum.map((value) => value / count)
  }

  /** a and g of the density over its mean: an even change by least squares, nowhere below nothing. */
  private change(points: Float64Array, d: number, dusty: number): number[] {
    const { values, heights } = this
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length
    const inside = Array.from(values.keys()).filter((k) => heights[k] > d)
    const level = values.length / dusty
    if (dusty < ENOUGH) return [level, 0, 0, 0]
    const centre = [0, 1, 2].map((a) => inside.reduce((sum, k) => sum + points[3 * k + a], 0) / inside.length)
    const rows = inside.map((k) => centre.map((value, a) => points[3 * k + a] - value))
    const places = new Matrix(rows)
    const normal = places
      .transpose()
      .mmul(places)
      .add(Matrix.eye(3, 3, 1e-6))
    const moments = places.transpose().mmul(Matrix.columnVector(inside.map((k) => values[k] / mean)))
    const g = solve(normal, moments).to1DArray()
    const least = Math.min(...rows.map((row) => dot(row, g)))
    const scale = Math.min(1, (0.98 * level) / -Math.min(least, -1e-9))
    const gentle = g.map((value) => scale * value)
    return [level - dot(centre, gentle), ...gentle]
  }
}

function dot(a: number[], b: number[]): number {
  return a.reduce((sum, value, i) => sum + value * b[i], 0)
}

function unit(v: number[]): number[] {
  const length = Math.hypot(...v)
  return v.map((value) => value / length)
}
