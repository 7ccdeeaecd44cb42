import type { ApertureSpectrum, CameraImages } from '../camera/types.js'
import { observedWavelengths } from '../model/wavelengths.js'
import { dustLight } from '../solve/dust-light.js'
import type { DustTemperatures } from '../solve/dust-temperatures.js'
import { playRounds, type RoundsOutcome, type RoundsProgress, type RoundsRequest } from '../solve/rounds.js'
import type { Estimator } from './estimator.js'
import { inLanes } from './in-lanes.js'
import { makeLightJob } from './make-light-job.js'
import { wavelengthsAbreast } from './memory.js'
import { observeColumns } from './observe-columns.js'
import { observeDeficit } from './observe-deficit.js'
import type { Studio } from './observe-wavelength.js'
import { type RunProgress, Stopped } from './progress.js'
import type { Shown } from './shown.js'
import { addTime, type PhaseTime, stopwatch } from './stopwatch.js'
import { emptyProducts, putValues, valuesOf, type Wanted, type WantedValues } from './wanted.js'
import type { Crew } from './with-crew.js'

/** Packets at one observed wavelength (cm), and the relative error they left in scattered light; NaN when none was asked for. */
export interface LightPackets {
  wavelength: number
  packets: number
  error: number
}

export interface LightStage {
  images: CameraImages[]
  spectra: ApertureSpectrum[]
  lightPackets: LightPackets[]
  time: PhaseTime
}

/** Names under which the ledger holds a wavelength that is done, and its packets and pictures half done. */
export const lightPieces = (index: number) => ({
  done: `light-${index}`,
  packets: `packets-${index}`,
  pictures: `pictures-${index}`
})

/** Where the packets of a wavelength come from: they are played, or others have played them. */
export type PacketSource = (
  request: RoundsRequest,
  index: number,
  onProgress: (progress: RoundsProgress) => void
) => Promise<RoundsOutcome | 'stopped'>

export interface LightOptions {
  estimator: Estimator
  onProgress: (progress: RunProgress) => void
  stop?: AbortSignal
  /** Default: they are played. */
  packetsFrom?: PacketSource
  /** Told of every picture and spectrum that is done. */
  onShown: (shown: Shown) => void
}

/** Images and spectra, a few wavelengths at a time, from the ledger as far as it goes. Throws WorkerFailure or Stopped. */
export async function lightStage(
  { model, pool, ledger, columnsToStars }: Crew,
  dust: DustTemperatures,
  options: LightOptions
): Promise<LightStage> {
  const { estimator, onProgress, stop, onShown } = options
  const play: PacketSource = (request, index, progress) =>
    playRounds(request, pool, ledger, lightPieces(index).packets, progress, stop)
  const packetsFrom = options.packetsFrom ?? play
  const { images, spectra, wantedAt } = emptyProducts(model.scene, estimator)
  const wavelengths = observedWavelengths(model.scene)
  const lightPackets: LightPackets[] = new Array(wavelengths.length)
  /** The first wavelength that is not done: progress is that of this one. */
  let front = 0
  const done = (index: number, packets: LightPackets, wanted: Wanted[]) => {
    lightPackets[index] = packets
    while (lightPackets[front]) front++
    for (const want of wanted) if (want.kind === 'camera') onShown({ kind: 'camera', images: want.images, k: want.k })
  }
  const clock = stopwatch()
  let time: PhaseTime = { wallSeconds: 0, cpuSeconds: 0 }
  const observe = async (wavelength: number, index: number): Promise<void> => {
    const wanted = wantedAt(wavelength)
    const names = lightPieces(index)
    const before = ledger.take(names.done) as DoneLight | undefined
    if (before) {
      putValues(wanted, before.values)
      done(index, { wavelength, packets: before.packets, error: before.error }, wanted)
      time = addTime(time, before.time)
      return
    }
    const report = (progress: Omit<RunProgress, 'wavelength' | 'index' | 'count'>) => {
      if (index === front) onProgress({ wavelength, index, count: wavelengths.length, ...progress })
    }
    // Rays look for light of point stars scattered once; packets find it themselves.
    const columns = estimator === 'emissivity' ? await columnsToStars(model) : []
    const light = dustLight(model, dust, wavelength, columns)
    const job = makeLightJob(model, light, estimator, wanted, pool)
    const found = job.request
      ? await packetsFrom(job.request, index, (round) => report({ stage: 'light', ...round, of: round.packets }))
      : { sums: undefined, packets: 0, error: 0 }
    if (found === 'stopped') throw new Stopped()
    const studio: Studio = {
      pool,
      ledger,
      name: names.pictures,
      onDone: (observer, rows, of) => report({ stage: 'pictures', observer, done: rows, of, round: 0, error: Number.NaN }),
      stop
    }
    const complete =
      (await job.develop(found.sums, studio)) &&
      (model.fields.length === 0 || (await observeDeficit(model, light, wanted, studio)))
    if (!complete || stop?.aborted) throw new Stopped()
    const { packets, error } = found
    // What has passed since the one before was done.
    const took = clock()
    time = addTime(time, took)
    done(index, { wavelength, packets, error }, wanted)
    // Pieces must not pile up faster than they are written.
    await ledger.settle()
    ledger.keep(names.done, { values: valuesOf(wanted), packets, error, time: took } satisfies DoneLight)
    ledger.forget(names.packets)
    ledger.forget(names.pictures)
  }
  const onDone: Studio['onDone'] = (observer, rows, of) =>
    onProgress({ stage: 'columns', observer, done: rows, of, round: 0, error: Number.NaN })
  const lookThrough = async () => {
    if (!(await observeColumns(model, images, { pool, onDone, stop }))) throw new Stopped()
    for (const each of images) onShown({ kind: 'column', images: each })
  }
  // Threads that wait for the last rays of one thing go on with another.
  const columns = lookThrough()
  columns.catch(() => {})
  await inLanes(wavelengths, wavelengthsAbreast(model, pool.size), observe)
  await columns
  for (const result of spectra) onShown({ kind: 'spectrum', result })
  time = addTime(time, clock())
  return { images, spectra, lightPackets, time }
}

/** A wavelength that is done, as the ledger holds it. */
interface DoneLight extends Record<string, unknown> {
  values: WantedValues[]
  packets: number
  error: number
  time: PhaseTime
}
