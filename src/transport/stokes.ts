import { cosineAt, drawPlace, ELEMENTS, type ScatteringTables, TABLE_STEPS } from '../dust/scattering-tables.js'

/**
 * Stokes parameters of a packet of intensity 1, referred to a direction d across its flight. Q > 0 is an electric vector along d;
 * U > 0 one turned from d by 45 deg, counter-clockwise for someone whom the light reaches; V > 0 turns counter-clockwise for him:
 * the signs of the IAU (1974, Transactions XVB, 166; from memory). U and V both have the opposite sign in Bohren & Huffman
 * (1983, chapter 2.11), which leaves the scattering matrix as it is.
 */
export class Stokes {
  q = 0
  u = 0
  v = 0
  /** Of the last scattering: cosine of its angle, and cosine and sine of the angle from d to its plane, seen as above. */
  mu = 1
  cos = 1
  sin = 0

  /** Unpolarised light. */
  clear(): void {
    this.q = 0
    this.u = 0
    this.v = 0
  }

  /**
   * Scatters the packet: the angle is drawn from s11, the plane from the distribution for its polarisation, and the Stokes
   * parameters follow by the matrix (Chandrasekhar 1960, section 17; Peest et al. 2017, A&A 601, A92, section 3). They are then
   * referred to the plane of scattering, to the direction in which the flight was turned, turned with it.
   */
  scatter(tables: ScatteringTables, law: number, uniform: () => number): void {
    const { elements } = tables
    const { q, u, v } = this
    const place = drawPlace(tables, law, uniform)
    const node = place < TABLE_STEPS ? place | 0 : TABLE_STEPS - 1
    const share = place - node
    const at = (law * (TABLE_STEPS + 1) + node) * ELEMENTS
    const s11 = elements[at] + share * (elements[at + ELEMENTS] - elements[at])
    const s12 = (elements[at + 1] + share * (elements[at + ELEMENTS + 1] - elements[at + 1])) / s11
    const s33 = (elements[at + 2] + share * (elements[at + ELEMENTS + 2] - elements[at + 2])) / s11
    const s34 = (elements[at + 3] + share * (elements[at + ELEMENTS + 3] - elements[at + 3])) / s11
    const most = 1 + Math.abs(s12) * Math.sqrt(q * q + u * u)
    // The direction of a point in the unit disk is the angle from d to the plane of scattering.
    let a = 0
    let b = 0
    let r2 = 0
    let along = 0
    do {
      a = 2 * uniform() - 1
      b = 2 * uniform() - 1
      r2 = a * a + b * b
      along = q * (a * a - b * b) + 2 * u * a * b
    } while (r2 > 1 || r2 < 1e-12 || uniform() * most * r2 > r2 + s12 * along)
    along /= r2
    const across = (u * (a * a - b * b) - 2 * q * a * b) / r2
    const intensity = 1 + s12 * along
    this.q = (s12 + tables.keeps[law] * along) / intensity
    this.u = (s33 * across + s34 * v) / intensity
    this.v = (s33 * v - s34 * across) / intensity
    const r = Math.sqrt(r2)
    this.mu = cosineAt(place)
    this.cos = a / r
    this.sin = b / r
  }

  /** Refers the parameters to the direction at (along, across), of any length, from d. */
  refer(along: number, across: number): void {
    const length2 = along * along + across * across
    if (!(length2 > 1e-30)) return
    const cos = (along * along - across * across) / length2
    const sin = (2 * along * across) / length2
    const { q, u } = this
    this.q = q * cos + u * sin
    this.u = u * cos - q * sin
  }
}
