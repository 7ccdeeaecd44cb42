import { NEAR_DIRECTIONS } from '../transport/observers.js'
import { AZIMUTH_BINS, azimuthLookup, isForward } from '../transport/scatter-medium.js'
import type { GroupSums } from './group-sums.js'
import { GROUPS } from './groups.js'
import {
  type CellVolumes,
  emptyLight,
  type NearLight,
  type ScatteredLight,
  type ScatteringLaws,
  spread
} from './scattered-light.js'

/** Which observers of a tally one scattered light is towards: that with number `first`, or so many from it on, of polar nodes. */
export interface SeenBy {
  first: number
  polarNodes: number
  /** Near cells of a place, and where in a tally they begin. */
  near?: { cells: Int32Array; offset: number }
}

/** Scattered light towards some of `observers` from tallies of two or three dimensions. */
export function fromTallies(
  { cells, volume, dimensions }: CellVolumes,
  { tables, asymmetry }: ScatteringLaws,
  tallies: GroupSums,
  { first, polarNodes, near }: SeenBy,
  observers: number
): ScatteredLight {
  const slots = dimensions === 2 ? AZIMUTH_BINS : 1
  const light = new TalliedLight(tallies, polarNodes * cells * slots, tables?.polarising ? 4 : 1)
  const { edges } = azimuthLookup(isForward(asymmetry))
  for (let cell = 0; cell < cells; cell++) {
    for (let slot = 0; slot < slots; slot++) {
      const at = cell * slots + slot
      const share = slots > 1 ? (Math.acos(edges[slot + 1]) - Math.acos(edges[slot])) / Math.PI : 1
      for (let node = 0; node < polarNodes; node++)
        light.take(at * observers + first + node, 1 / (volume[cell] * share), node * cells * slots + at)
    }
  }
  return { slots, polarNodes, ...light.found, ...(near && { near: nearLight(volume, tallies, near, light.parts) }) }
}

function nearLight(
  volume: Float64Array,
  tallies: GroupSums,
  { cells, offset }: { cells: Int32Array; offset: number },
  parts: 1 | 4
): NearLight {
  const all = cells.length * NEAR_DIRECTIONS
  const light = new TalliedLight(tallies, all, parts)
  for (let i = 0; i < all; i++) light.take(offset + i, 1 / volume[cells[Math.floor(i / NEAR_DIRECTIONS)]], i)
  return { cells, ...light.found }
}

/** Light from a tally with I, or I, Q, U and V, at each of its places. */
class TalliedLight {
  readonly found: Pick<ScatteredLight, 'value' | 'groups' | 'polarised'>

  constructor(
    private readonly tallies: GroupSums,
    length: number,
    readonly parts: 1 | 4
  ) {
    this.found = { ...emptyLight(length, 1), ...(parts === 4 && { polarised: { parts: 3, ...emptyLight(length, 3) } }) }
  }

  /** Takes what stands at a place of the tally, scaled, for the value with number `to`. */
  take(place: number, scale: number, to: number): void {
    const { tallies, parts } = this
    const { value, groups, polarised } = this.found
    value[to] = spread(tallies, place * parts, scale, groups, to * GROUPS)
    if (!polarised) return
    for (let i = 0; i < 3; i++) {
      const at = 3 * to + i
      polarised.value[at] = spread(tallies, place * parts + 1 + i, scale, polarised.groups, at * GROUPS)
    }
  }
}
