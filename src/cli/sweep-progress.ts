import type { SweepProgress } from '../sweep/players/run-here.js'
import { type Sink, startLine } from './status-line.js'
import { duration } from './words.js'

/** Shows how far a sweep has come: models done, in work, and the time left. */
export function startSweepProgress(sink: Sink, quiet: boolean): { show: (progress: SweepProgress) => void; clear: () => void } {
  const start = performance.now()
  const line = startLine(sink, quiet)
  return {
    show: ({ done, of, failed, running }) => {
      const elapsed = (performance.now() - start) / 1000
      const left = done > 0 ? `, about ${duration((elapsed * (of - done)) / done)} left` : ''
      const lost = failed > 0 ? `, ${failed} failed` : ''
      line.show(`${done} of ${of} models${lost}, in work: ${running.slice(0, 4).join(', ') || 'none'}${left}`)
    },
    clear: line.clear
  }
}
