const BITS = 32

/**
 * Of each dimension after the first: the primitive polynomial, its coefficients as bits, and the first direction integers m.
 * Joe & Kuo 2008, SIAM J. Sci. Comput. 30, 2635 (their table new-joe-kuo-6).
 */
const directions: [polynomial: number, first: number[]][] = [
  [3, [1]],
  [7, [1, 3]],
  [11, [1, 3, 1]],
  [13, [1, 1, 1]],
  [19, [1, 1, 3, 3]],
  [25, [1, 3, 5, 13]],
  [37, [1, 1, 5, 5, 17]],
  [41, [1, 1, 5, 5, 5]],
  [47, [1, 1, 7, 11, 19]],
  [55, [1, 1, 5, 1, 1]],
  [59, [1, 1, 1, 3, 11]],
  [61, [1, 3, 5, 5, 31]],
  [67, [1, 3, 3, 9, 7, 49]],
  [91, [1, 1, 1, 15, 21, 21]],
  [97, [1, 3, 1, 13, 27, 49]]
]

export const mostSobolDimensions = directions.length + 1

/**
 * The points of the Sobol sequence in the unit cube, one after another, in the order of the Gray code (Antonov & Saleev 1979). With
 * `uniform` they are scrambled by random lower-triangular matrices and a digital shift (Matousek 1998, J. Complexity 14, 527), which
 * keeps their evenness and makes each point uniform in (0, 1).
 */
export class SobolSequence {
  /** The present point; the first one from the start. */
  readonly point: Float64Array
  private readonly columns: Uint32Array[]
  private readonly state: Uint32Array
  private readonly middle: number
  private index = 0

  /** Throws RangeError beyond `mostSobolDimensions`. */
  constructor(dimensions: number, uniform?: () => number) {
    if (dimensions > mostSobolDimensions) throw new RangeError(`at most ${mostSobolDimensions} dimensions`)
    this.columns = Array.from({ length: dimensions }, (_, d) => Uint32Array.from(scrambled(directionNumbers(d), uniform)))
    this.state = Uint32Array.from(this.columns, () => (uniform ? word(uniform) : 0))
    this.middle = uniform ? 0.5 : 0
    this.point = new Float64Array(dimensions)
    this.show()
  }

  /** Goes on to the next point. */
  next(): void {
    const { state, columns, index } = this
    // The lowest zero bit of the index tells which bit of the Gray code changes.
    const bit = Math.clz32(1) - Math.clz32(~index & (index + 1))
    for (let d = 0; d < state.length; d++) state[d] ^= columns[d][bit]
    this.index++
    this.show()
  }

  private show(): void {
    const { point, state, middle } = this
    for (let d = 0; d < point.length; d++) point[d] = (state[d] + middle) / 2 ** BITS
  }
}

/** The first `count` points of a SobolSequence, one array of `dimensions` numbers a point. */
export function sobolPoints(count: number, dimensions: number, uniform?: () => number): number[][] {
  const sequence = new SobolSequence(dimensions, uniform)
  return Array.from({ length: count }, () => {
    const point = Array.from(sequence.point)
    sequence.next()
    return point
  })
}

/** The direction numbers of a dimension as fractions in 32 bits, most significant first. */
function directionNumbers(dimension: number): number[] {
  if (dimension === 0) return Array.from({ length: BITS }, (_, k) => 2 ** (BITS - 1 - k))
  const [polynomial, first] = directions[dimension - 1]
  const degree = first.length
  const numbers = first.map((m, k) => (m << (BITS - 1 - k)) >>> 0)
  for (let k = degree; k < BITS; k++) {
    let next = numbers[k - degree] ^ (numbers[k - degree] >>> degree)
    for (let j = 1; j < degree; j++) if ((polynomial >> (degree - j)) & 1) next ^= numbers[k - j]
    numbers.push(next >>> 0)
  }
  return numbers
}

/** Multiplies binary digits by a random lower-triangular matrix with ones on its diagonal. */
function scrambled(numbers: number[], uniform?: () => number): number[] {
  if (!uniform) return numbers
  const rows = Array.from({ length: BITS }, (_, k) => {
    const above = k === 0 ? 0 : (word(uniform) & (-1 << (BITS - k))) >>> 0
    return (above | (1 << (BITS - 1 - k))) >>> 0
  })
  return numbers.map((number) => rows.reduce((bits, row, k) => bits + parity(row & number) * 2 ** (BITS - 1 - k), 0))
}

function parity(bits: number): number {
  let folded = bits
  for (let shift = 16; shift > 0; shift >>= 1) folded ^= folded >>> shift
  return folded & 1
}

function word(uniform: () => number): number {
  return Math.floor(uniform() * 2 ** BITS) >>> 0
}
