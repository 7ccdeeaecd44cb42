import type { GrainOptics } from '../dust/grains/grain-optics.js'
import { type OpticsRow, opticsOfRows } from '../dust/grains/grain-optics.js'
import { largestRadius } from '../dust/grains/make-grain.js'
import { type GrainTableRequest, grainTable, mixtureOptics } from '../dust/grains/tabulate-grains.js'
import { grainRequest } from '../dust/grains-law.js'
import { observedWavelengths } from '../model/wavelengths.js'
import type { Scene } from '../scene/types.js'
import { ambientField } from '../sources/ambient.js'
import { starSpectrum } from '../sources/star.js'
import { WorkerPool } from '../workers/pool.js'
import { keepTable, keptTable } from './grain-cache.js'
import { type RunProgress, Stopped } from './progress.js'

/** Tables of the optics of grains, by the name of the opacity. */
export type GrainTables = Record<string, GrainOptics>

/** What takes longer than this goes to worker threads, ms. */
const SHORT = 500
/** Size parameter up to which one wavelength takes less than about that. */
const EASY = 1e4

/**
 * Tables for those opacities of a scene that are grains (default: those of its dust), from the user's cache or by Mie theory on `workers` threads. They do not
 * depend on the number of threads. Throws Stopped or WorkerFailure.
 */
export async function grainTables(
  scene: Scene,
  workers: number,
  onProgress: (progress: RunProgress) => void = () => {},
  stop?: AbortSignal,
  names = [...new Set(scene.dust.map(({ opacity }) => opacity))]
): Promise<GrainTables> {
  const tables: GrainTables = {}
  for (const name of names) {
    const spec = scene.opacities[name]
    if (spec.law !== 'grains') continue
    const request = grainRequest(spec, ...wavelengthRange(scene))
    const kept = keptTable(request)
    tables[name] =
      kept ??
      (await makeTable(request, workers, stop, (done, of, round) => onProgress({ ...idle, opacity: name, done, of, round })))
    if (!kept) await keepTable(request, tables[name])
  }
  return tables
}

const idle = { stage: 'grains', error: Number.NaN } as const

/** Shortest and longest wavelength (cm) of the light of the sources and of the observers. */
function wavelengthRange(scene: Scene): [number, number] {
  const shining = scene.sources.flatMap((source) =>
    source.kind === 'star' ? starSpectrum(source).range : ambientField(source).range
  )
  const wavelengths = [...shining, ...observedWavelengths(scene)]
  return [Math.min(...wavelengths), Math.max(...wavelengths)]
}

async function makeTable(
  request: GrainTableRequest,
  workers: number,
  stop: AbortSignal | undefined,
  onProgress: (done: number, of: number, round: number) => void
): Promise<GrainOptics> {
  const { populations, angles } = request
  const circumference = 2 * Math.PI * largestRadius(populations)
  const start = performance.now()
  let pool: WorkerPool | undefined
  const opticsAt = async (wavelengths: number[], round: number): Promise<GrainOptics> => {
    const rows: OpticsRow[] = []
    const add = (optics: GrainOptics) => {
      rows.push({ optics, w: 0 })
      onProgress(rows.length, wavelengths.length, round)
    }
    const quick = () => circumference / wavelengths[rows.length] < EASY && performance.now() - start < SHORT
    while (rows.length < wavelengths.length && quick()) add(mixtureOptics(populations, [wavelengths[rows.length]], angles))
    if (rows.length < wavelengths.length) {
      if (!pool) {
        pool = new WorkerPool(workers, new URL('./thread.js', import.meta.url))
        pool.share('grains', { populations, angles })
      }
      const tasks = wavelengths.slice(rows.length).map((wavelength) => ({ name: 'grains', input: wavelength }))
      await pool.run(tasks, (optics) => add(optics as GrainOptics), stop)
      if (stop?.aborted) throw new Stopped()
    }
    return opticsOfRows(rows)
  }
  try {
    const steps = grainTable(request)
    let step = steps.next()
    for (let round = 0; !step.done; round++) step = steps.next(await opticsAt(step.value, round))
    return step.value
  } finally {
    await pool?.close()
  }
}
