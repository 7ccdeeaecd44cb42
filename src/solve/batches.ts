import { GROUPS } from './groups.js'

/** Fewest batches in a group unless it is told otherwise, the most, and the packets of a batch that are worth dividing it. */
const FEWEST = 2
const MOST = 1024
const PACKETS = 8192
/** So many values of a tally are emptied, handed over and added in a few per cent of the time of a packet among as many cells. */
const VALUES_A_PACKET = 64

/** How a round is divided: batches of equally many packets, an equal number of batches to each group, one after the other. */
export interface Batches {
  count: number
  /** Of each batch, at least one. */
  packets: number
}

/**
 * Depends on packets and on what a tally tells of, `tallied` cells or pixels, alone, so that results do not depend on who computes them;
 * `fewest`: batches in a group.
 */
export function divide(packets: number, tallied: number, fewest = FEWEST): Batches {
  const worthDividing = GROUPS * Math.max(PACKETS, tallied / VALUES_A_PACKET)
  const inGroup = Math.min(MOST, Math.max(fewest, Math.ceil(packets / worthDividing)))
  const count = GROUPS * inGroup
  return { count, packets: Math.max(1, Math.round(packets / count)) }
}

export function groupOf(batch: number, { count }: Batches): number {
  return Math.floor((batch * GROUPS) / count)
}
