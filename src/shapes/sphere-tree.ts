/** Most spheres in a leaf. */
const LEAF = 8

/**
 * Finds the spheres that hold a point: a binary tree of boxes about them, halved at the median of the longest side, in flat
 * arrays. Node n has the children 2 n + 1 and 2 n + 2 and the box 6 n; its spheres are a range of `order`.
 */
export class SphereTree {
  private readonly order: Int32Array
  private readonly boxes: Float64Array
  private readonly levels: number
  /** Where the spheres of a node begin, for every node; the end is the beginning of the next of its level. */
  private readonly starts: Int32Array
  private readonly ends: Int32Array

  constructor(
    private readonly x: ArrayLike<number>,
    private readonly y: ArrayLike<number>,
    private readonly z: ArrayLike<number>,
    private readonly radius: ArrayLike<number>
  ) {
    const count = x.length
    this.levels = Math.max(0, Math.ceil(Math.log2(Math.max(1, count) / LEAF)))
    const nodes = 2 ** (this.levels + 1) - 1
    this.order = Int32Array.from({ length: count }, (_, i) => i)
    this.boxes = new Float64Array(6 * nodes)
    this.starts = new Int32Array(nodes)
    this.ends = new Int32Array(nodes)
    this.divide(0, 0, count, 0)
  }

  /** Writes the indices of the spheres that hold a point into `out`, as many as fit, and returns their number. */
  find(px: number, py: number, pz: number, out: Int32Array): number {
    const { boxes, starts, ends, order, x, y, z, radius } = this
    const firstLeaf = 2 ** this.levels - 1
    let found = 0
    let node = 0
    for (;;) {
      const b = 6 * node
      const inside =
        px >= boxes[b] &&
        px <= boxes[b + 1] &&
        py >= boxes[b + 2] &&
        py <= boxes[b + 3] &&
        pz >= boxes[b + 4] &&
        pz <= boxes[b + 5]
      if (inside && node < firstLeaf) {
        node = 2 * node + 1
        continue
      }
      if (inside) {
        for (let k = starts[node]; k < ends[node]; k++) {
          const i = order[k]
          const dx = px - x[i]
          const dy = py - y[i]
          const dz = pz - z[i]
          if (dx * dx + dy * dy + dz * dz < radius[i] * radius[i]) {
            if (found < out.length) out[found] = i
            found++
          }
        }
      }
      // The next node in order of depth: up from right children, then to the sibling.
      while (node > 0 && node % 2 === 0) node = (node - 1) >> 1
      if (node === 0) return found
      node++
    }
  }

  private divide(node: number, from: number, to: number, level: number): void {
    const { boxes, order, radius } = this
    this.starts[node] = from
    this.ends[node] = to
    let axis = this.x
    let widest = -1
    for (const [a, values] of [this.x, this.y, this.z].entries()) {
      let low = Number.POSITIVE_INFINITY
      let high = Number.NEGATIVE_INFINITY
      let [least, most] = [low, high]
      for (let k = from; k < to; k++) {
        const i = order[k]
        low = Math.min(low, values[i] - radius[i])
        high = Math.max(high, values[i] + radius[i])
        least = Math.min(least, values[i])
        most = Math.max(most, values[i])
      }
      boxes[6 * node + 2 * a] = low
      boxes[6 * node + 2 * a + 1] = high
      if (most - least > widest) {
        widest = most - least
        axis = values
      }
    }
    if (level === this.levels) return
    order.subarray(from, to).sort((i, j) => axis[i] - axis[j] || i - j)
    const middle = (from + to) >> 1
    this.divide(2 * node + 1, from, middle, level + 1)
    this.divide(2 * node + 2, middle, to, level + 1)
  }
}
