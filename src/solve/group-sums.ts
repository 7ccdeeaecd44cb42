import { allocateShared } from '../math/allocate.js'
import { GROUPS } from './groups.js'

/** Sums of packets x tally over the batches of each group, on shared memory, and the packets behind them. */
export interface GroupSums {
  /** GROUPS arrays as long as a tally; none before the first batch. */
  sums: Float64Array[]
  packets: number[]
}

export function emptySums(): GroupSums {
  return { sums: [], packets: new Array(GROUPS).fill(0) }
}

/** Takes the tally of a batch of `packets` packets into a group. The order of calls decides the last bits. */
export function addTally({ sums, packets }: GroupSums, group: number, tally: Float64Array, count: number): void {
  sums[group] ??= new Float64Array(allocateShared(8 * tally.length))
  addTo(sums[group], tally, count)
  packets[group] += count
}

/** Adds a tally of `count` packets to a sum. */
export function addTo(sum: Float64Array, tally: Float64Array, count: number): void {
  for (let i = 0; i < sum.length; i++) sum[i] += count * tally[i]
}

/** A copy that later batches do not change. */
export function copySums({ sums, packets }: GroupSums): GroupSums {
  return { sums: Array.from(sums, (sum) => sum?.slice()), packets: [...packets] }
}
