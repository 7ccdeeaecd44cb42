import type { RunProgress } from '../run/progress.js'
import { secondsLeft } from '../run/seconds-left.js'
import type { EffortSpec } from '../scene/types.js'
import { duration, shown, wavelengthText } from './words.js'

/** Nothing is shown before this, s. */
const QUIET_START = 2
/** Time between two showings, s: of a line that is rewritten, and of lines that stay. */
const REWRITTEN = 0.2
const STAYING = 5

/** Where progress goes: a terminal, or a file or pipe. */
type Sink = Pick<NodeJS.WriteStream, 'write' | 'isTTY' | 'columns'>

/** Shows what a run is doing: one line rewritten on a terminal, a new one every few seconds elsewhere, none when `quiet`. */
export function startProgress(
  sink: Sink,
  effort: EffortSpec,
  quiet: boolean
): { show: (progress: RunProgress) => void; clear: () => void } {
  const start = performance.now()
  const interval = sink.isTTY ? REWRITTEN : STAYING
  let shownAt = Number.NEGATIVE_INFINITY
  let onLine = false
  let stage: { key: string; start: number; packets: number } | undefined
  const show = (progress: RunProgress) => {
    const now = (performance.now() - start) / 1000
    const key = `${progress.stage} ${progress.index} ${progress.round}`
    if (stage?.key !== key) stage = { key, start: now, packets: progress.done }
    if (quiet || now < QUIET_START || now - shownAt < interval) return
    shownAt = now
    const line = lineOf(progress, (progress.done - stage.packets) / (now - stage.start), now, effort)
    if (sink.isTTY) {
      sink.write(`\r\x1b[K${line.slice(0, (sink.columns ?? 80) - 1)}`)
      onLine = true
    } else sink.write(`${line}\n`)
  }
  const clear = () => {
    if (onLine) sink.write('\r\x1b[K')
    onLine = false
  }
  return { show, clear }
}

function lineOf(progress: RunProgress, rate: number, elapsed: number, effort: EffortSpec): string {
  if (progress.stage === 'grains') return grainsLine(progress)
  const { stage, wavelength, index = 0, count = 0, done, of, error, observer } = progress
  const left = secondsLeft(progress, rate, elapsed, effort)
  const at = wavelength === undefined ? '' : `wavelength ${index + 1} of ${count} (${wavelengthText(wavelength * 1e4)}), `
  const parts = [
    stage === 'pictures'
      ? `${at}${observer?.kind} ${observer?.name}: ${Math.round((100 * done) / of)} %`
      : `${stage === 'dust' ? 'dust temperatures, ' : at}round ${progress.round + 1}: ${Math.round((100 * done) / of)} % of ${of} packets`,
    ...(stage !== 'pictures' && rate > 0 && Number.isFinite(rate) ? [`${shown(rate, 2)} packets/s`] : []),
    ...(Number.isFinite(error) ? [`error ${(100 * error).toPrecision(2)} %`] : []),
    ...(left === undefined ? [] : [`about ${duration(left)} left`])
  ]
  return parts.join(', ')
}

function grainsLine({ opacity, wavelength, done, of, round }: RunProgress): string {
  const rows = round === 0 ? 'first wavelengths' : `refinement ${round}`
  return `grains of ${opacity}, ${wavelength === undefined ? rows : 'scattering matrices'}: ${done} of ${of}`
}
