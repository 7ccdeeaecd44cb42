import type { Ledger, Piece } from '../workers/ledger.js'
import type { WorkerPool } from '../workers/pool.js'
import { runKept } from '../workers/run-kept.js'
import { type Batches, divide, groupOf } from './batches.js'
import { addTally, addTo, emptySums, type GroupSums } from './group-sums.js'
import { GROUPS } from './groups.js'
import { batchTasks, type RoundsProgress, type RoundsRequest } from './rounds.js'

/** A part of the batches of one round: groups that lie in it as a whole are summed, others kept batch by batch. */
export interface Share {
  /** Batches `from` up to, not including, `to`. */
  from: number
  to: number
  groups: { group: number; sum: Float64Array }[]
  loose: { batch: number; tally: Float64Array }[]
}

/** The batches that fall to one of several equal parts; `part` counts from 0. */
export function shareOf(part: number, parts: number, { count }: Batches): { from: number; to: number } {
  return { from: Math.floor((part * count) / parts), to: Math.floor(((part + 1) * count) / parts) }
}

/**
 * Plays a share of the one round that a request without a precision has. Goes on from what the ledger holds under `name`, and
 * keeps it there.
 */
export async function playShare(
  request: RoundsRequest,
  { from, to }: { from: number; to: number },
  pool: WorkerPool,
  ledger: Ledger,
  name: string,
  onProgress: (progress: RoundsProgress) => void,
  stop?: AbortSignal
): Promise<Share | 'stopped'> {
  const batches = divide(request.atMost, request.tallied)
  const state = (ledger.take(name) as (Share & { done: number }) | undefined) ?? { from, to, groups: [], loose: [], done: 0 }
  const inGroup = batches.count / GROUPS
  const take = (output: unknown, index: number) => {
    const batch = from + index
    const tally = output as Float64Array
    const group = groupOf(batch, batches)
    if (group * inGroup < from || (group + 1) * inGroup > to) state.loose.push({ batch, tally })
    else {
      const last = state.groups.at(-1)
      const { sum } = last?.group === group ? last : { sum: new Float64Array(tally.length) }
      if (last?.group !== group) state.groups.push({ group, sum })
      addTo(sum, tally, batches.packets)
    }
    state.done = index + 1
    onProgress({ round: 0, done: state.done * batches.packets, packets: (to - from) * batches.packets, error: Number.NaN })
  }
  const piece = (): Piece => ({
    ...state,
    groups: state.groups.map(({ group, sum }) => ({ group, sum: sum.slice() })),
    loose: [...state.loose]
  })
  pool.share('scattering', request.medium, name)
  const tasks = batchTasks(request, name, 0, batches).slice(from, to)
  const complete = await runKept({ tasks, done: state.done, take, name, piece }, pool, ledger, stop)
  pool.forget('scattering', name)
  const { groups, loose } = state
  return complete ? { from, to, groups, loose } : 'stopped'
}

/** The sums of all batches from shares that together hold each once: the same bits as one process would have found. */
export function joinShares(shares: Share[], { count, packets }: Batches): GroupSums {
  const all = emptySums()
  const inGroup = count / GROUPS
  for (const { groups } of shares)
    for (const { group, sum } of groups) {
      all.sums[group] = sum
      all.packets[group] = inGroup * packets
    }
  const loose = shares.flatMap((share) => share.loose).sort((a, b) => a.batch - b.batch)
  for (const { batch, tally } of loose) addTally(all, groupOf(batch, { count, packets }), tally, packets)
  return all
}
