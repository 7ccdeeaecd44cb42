import { totalmem } from 'node:os'
import { memoryEstimate, type Sizes, totalMemory } from './memory.js'

/** A run would need more memory than it may have; the message says what would make it fit. Exit code 2. */
export class MemoryError extends Error {
  override name = 'MemoryError'
}

/** Refuses a run that is expected to need more than `limit` bytes; by default what the machine, or its container, has. */
export function requireMemory(sizes: Sizes, workers: number, limit = machineMemory()): void {
  const neededBy = (count: number) => totalMemory(memoryEstimate(sizes, count), count)
  const needed = neededBy(workers)
  if (needed <= limit) return
  const { worker, cells, images } = memoryEstimate(sizes, workers)
  const rest = needed - limit
  let fewer = workers - 1
  while (fewer >= 1 && neededBy(fewer) > limit) fewer--
  const advice = [
    ...(fewer >= 1 ? [`${fewer === 1 ? '1 worker' : `${fewer} workers`} instead of ${workers} (--workers)`] : []),
    ...(images > rest ? [`images with ${share(1 - rest / images)} of their pixels or wavelengths`] : []),
    ...(cells + worker * workers > rest
      ? [`${share(1 - rest / (cells + worker * workers))} of the ${sizes.cells} cells (grid)`]
      : [])
  ]
  const fit =
    advice.length > 0 ? `it would fit with ${advice.join(', or ')}` : 'fewer cells, pixels and workers together would make it fit'
  throw new MemoryError(
    `about ${shown(needed)} of memory would be needed, ${shown(limit)} may be used; ${fit}; --memory sets the limit`
  )
}

/** Memory of the machine or of the container that the program runs in, bytes. */
export function machineMemory(): number {
  const constrained = process.constrainedMemory()
  return constrained > 0 ? Math.min(totalmem(), constrained) : totalmem()
}

function shown(bytes: number): string {
  return bytes < 1e9 ? `${Math.ceil(bytes / 1e6)} MB` : `${(bytes / 1e9).toPrecision(3)} GB`
}

/** A share for people, rounded down. */
function share(value: number): string {
  return value >= 0.01 ? `${Math.floor(100 * value)} %` : `${Number((100 * value).toPrecision(1))} %`
}
