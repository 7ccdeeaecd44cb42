import { ELEMENTS, type ScatteringTables, TABLE_STEPS, tablePosition } from '../dust/scattering-tables.js'

/**
 * Stokes parameters, per sr, of light of intensity 1 and polarisation q, u, v in `frame` (from `from` on: flight, d, e) that a law
 * scatters towards an observer (frame `seen`, from `at` on), referred to his north; into `out` at `to`. Signs as in Polarisation.
 */
export function scatterTowards(
  tables: ScatteringTables,
  law: number,
  frame: Float64Array,
  from: number,
  q: number,
  u: number,
  v: number,
  seen: Float64Array,
  at: number,
  out: Float64Array,
  to: number
): void {
  const { elements } = tables
  const ox = seen[at]
  const oy = seen[at + 1]
  const oz = seen[at + 2]
  const kx = frame[from]
  const ky = frame[from + 1]
  const kz = frame[from + 2]
  const cosine = kx * ox + ky * oy + kz * oz
  const place = tablePosition(Math.max(-1, Math.min(1, cosine)))
  const node = place < TABLE_STEPS ? place | 0 : TABLE_STEPS - 1
  const share = place - node
  const i = (law * (TABLE_STEPS + 1) + node) * ELEMENTS
  const s11 = elements[i] + share * (elements[i + ELEMENTS] - elements[i])
  const s12 = elements[i + 1] + share * (elements[i + ELEMENTS + 1] - elements[i + 1])
  const s33 = elements[i + 2] + share * (elements[i + ELEMENTS + 2] - elements[i + 2])
  const s34 = elements[i + 3] + share * (elements[i + ELEMENTS + 3] - elements[i + 3])
  // The plane of scattering as the packet sees it, from d, and as the observer sees it, from north.
  const od = frame[from + 3] * ox + frame[from + 4] * oy + frame[from + 5] * oz
  const oe = frame[from + 6] * ox + frame[from + 7] * oy + frame[from + 8] * oz
  const kn = kx * seen[at + 3] + ky * seen[at + 4] + kz * seen[at + 5]
  const ke = kx * seen[at + 6] + ky * seen[at + 7] + kz * seen[at + 8]
  const inwards = od * od + oe * oe
  const outwards = kn * kn + ke * ke
  if (!(inwards > 1e-20 && outwards > 1e-20)) {
    // Exactly forward or backward there is no plane, and no packet.
    out[to] = s11
    out[to + 1] = 0
    out[to + 2] = 0
    out[to + 3] = 0
    return
  }
  const cos2 = (od * od - oe * oe) / inwards
  const sin2 = (2 * od * oe) / inwards
  const along = q * cos2 + u * sin2
  const across = u * cos2 - q * sin2
  const inPlane = s12 + tables.keeps[law] * s11 * along
  const slanted = s33 * across + s34 * v
  const cos2n = (kn * kn - ke * ke) / outwards
  const sin2n = (2 * kn * ke) / outwards
  out[to] = s11 + s12 * along
  out[to + 1] = inPlane * cos2n - slanted * sin2n
  out[to + 2] = inPlane * sin2n + slanted * cos2n
  out[to + 3] = s33 * v - s34 * across
}
