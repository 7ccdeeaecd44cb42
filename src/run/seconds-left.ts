import type { EffortSpec } from '../scene/types.js'
import type { RunProgress } from './progress.js'

const FIRST_ROUND = 16_384

/**
 * Time (s) that is left: for the temperatures those of the dust alone, afterwards that of the whole run, from what it took so
 * far. Errors are taken to fall as the square root of the packets. `rate` is in packets per second. Undefined while unknown.
 */
export function secondsLeft(progress: RunProgress, rate: number, elapsed: number, effort: EffortSpec): number | undefined {
  if (progress.stage === 'grains' || progress.stage === 'starlight') return undefined
  const { stage, index = 0, count = 1, done, of } = progress
  if (stage === 'dust') return rate > 0 && Number.isFinite(rate) ? dustPackets(progress, effort) / rate : undefined
  const share = (index + (stage === 'light' ? 0.5 : 0.9) * (done / of)) / count
  return share > 0 ? (elapsed * (1 - share)) / share : undefined
}

/** Packets of the temperatures still to come: each round stands alone, is twice the one before, and all are within the limit. */
function dustPackets({ done, of, error, round }: RunProgress, { precision, equilibrium }: EffortSpec): number {
  const before = FIRST_ROUND * (2 ** round - 1)
  if (precision === null) return Math.max(of - done, equilibrium - before - done)
  let left = of - done
  if (!Number.isFinite(error)) return left
  const needed = (of / 2) * (error / precision) ** 2
  for (let size = 2 * of, spent = before + of; size / 2 < needed && spent < equilibrium; size *= 2) {
    left += Math.min(size, equilibrium - spent)
    spent += size
  }
  return left
}
