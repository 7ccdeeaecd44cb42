import type { RunProgress } from '../run/progress.js'
import { secondsLeft } from '../run/seconds-left.js'
import type { EffortSpec } from '../scene/types.js'
import { type Sink, startLine } from './status-line.js'
import { duration, shown, wavelengthText } from './words.js'

/** Shows what a run is doing. */
export function startProgress(
  sink: Sink,
  effort: EffortSpec,
  quiet: boolean
): { show: (progress: RunProgress) => void; clear: () => void } {
  const start = performance.now()
  const line = startLine(sink, quiet)
  let stage: { key: string; start: number; packets: number } | undefined
  const show = (progress: RunProgress) => {
    const now = (performance.now() - start) / 1000
    const key = `${progress.stage} ${progress.index} ${progress.round}`
    if (stage?.key !== key) stage = { key, start: now, packets: progress.done }
    if (line.isDue()) line.show(lineOf(progress, (progress.done - stage.packets) / (now - stage.start), now, effort))
  }
  return { show, clear: line.clear }
}

function lineOf(progress: RunProgress, rate: number, elapsed: number, effort: EffortSpec): string {
  if (progress.stage === 'grains') return grainsLine(progress)
  if (progress.stage === 'columns')
    return `column density, camera ${progress.observer?.name}: ${Math.round((100 * progress.done) / progress.of)} %`
  if (progress.stage === 'starlight') return `dust between stars and cells: ${Math.round((100 * progress.done) / progress.of)} %`
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
