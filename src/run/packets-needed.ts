import type { RunResult } from './run-result.js'

/** Packets with which the precision would have been reached, when the error falls as their square root. */
export interface PacketsNeeded {
  /** For the dust temperatures. */
  equilibrium?: number
  /** For the wavelength that needs most. */
  cameras?: number
}

/** What was too few; nothing when both sufficed or exactly the packets given were to be spent. */
export function packetsNeeded({ model, equilibrium, lightPackets }: RunResult): PacketsNeeded {
  const { precision } = model.scene.effort
  if (precision === null) return {}
  const last = equilibrium?.rounds.at(-1)
  const most = Math.max(
    0,
    ...lightPackets.map(({ packets, error }) => (error > precision ? packets * (error / precision) ** 2 : 0))
  )
  return {
    // Each round stands alone, and those before the last cost as much again; unsettled temperatures take a larger one.
    ...(last && !equilibrium?.reached && { equilibrium: 2 * last.packets * Math.max(2, (last.worst / precision) ** 2) }),
    ...(most > 0 && { cameras: most })
  }
}
