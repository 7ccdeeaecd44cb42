import { pixelFrame, seenFrom } from '../camera/frame.js'
import type { PatchIntegral } from '../camera/patch.js'
import type { FieldData } from '../camera/ray-field.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, SCATTERED } from '../camera/ray-values.js'
import type { PictureRows } from '../camera/rows.js'
import { putStokes, STOKES } from '../camera/stokes-planes.js'
import { turnStokes } from '../camera/stokes-ray.js'
import { standardError } from '../math/stats.js'
import type { Model } from '../model/model.js'
import { isFromPlace } from '../scene/is-from-place.js'
import type { DustLight } from '../solve/dust-light.js'
import { GROUPS } from '../solve/groups.js'
import type { ScatteredLight } from '../solve/scattered-light.js'
import type { Ledger, Piece } from '../workers/ledger.js'
import type { WorkerPool } from '../workers/pool.js'
import { runKept } from '../workers/run-kept.js'
import { fieldOn, surveyBeyondOn, surveyOn } from './look.js'
import { mediumFor } from './observers-of.js'
import { addStars, directFlux } from './stars-seen.js'
import { putValues, valuesOf, type Wanted, type WantedValues } from './wanted.js'

/** Bright rows take long: with few in a task no thread waits long for the last of them. */
const ROWS_A_TASK = 2

/** Rays to a radius are seen through a mirror where the cells are symmetric about the plane of the observer and the axis. */
const mirrored = (model: Model) => model.dimensions < 3

/** Relative accuracy with which rays are placed: a tenth of the precision asked for, or of 1 %. */
function placingTolerance(model: Model): number {
  return 0.1 * (model.scene.effort.precision ?? 0.01)
}

/** What it takes to make pictures beside what is in them. */
export interface Studio {
  pool: WorkerPool
  /** Where pictures half done are kept, and under which name. */
  ledger: Ledger
  name: string
  onDone: (observer: { kind: Wanted['kind']; name: string }, done: number, of: number) => void
  stop: AbortSignal | undefined
}

/** How far the pictures of a wavelength are: some of the wanted are done, and some tasks of the next. */
interface Progress {
  want: number
  tasks: number
  /** Sum of the estimated errors of placing rays in those tasks. */
  placing: number
}

/** Makes the pictures and fluxes of everything wanted at one wavelength; false when it was stopped before the end. */
export async function observeWavelength(
  model: Model,
  light: DustLight,
  scattered: ScatteredLight[],
  wanted: Wanted[],
  indices: number[],
  studio: Studio
): Promise<boolean> {
  const tolerance = placingTolerance(model)
  const { ledger, name, stop } = studio
  const before = ledger.take(name) as { progress: Progress; values: WantedValues[] } | undefined
  if (before) putValues(wanted, before.values)
  const progress = before?.progress ?? { want: 0, tasks: 0, placing: 0 }
  const piece = (): Piece => ({ progress: { ...progress }, values: valuesOf(wanted) })
  while (progress.want < wanted.length) {
    if (stop?.aborted) return false
    const want = wanted[progress.want]
    const medium = mediumFor(model, light, scattered, indices[progress.want])
    const onDone = (done: number, of: number) => studio.onDone({ kind: want.kind, name: want.spec.name }, done, of)
    if (want.kind === 'camera') {
      const view = seenFrom(model, want.spec.view)
      const data = await fieldOn(studio.pool, medium, view, tolerance)
      const rows = { data, want, tolerance, progress, piece, onDone }
      if (!(await takePicture(model, rows, studio))) return false
      addStars(model, light, view, want, progress.placing)
    } else {
      const view = seenFrom(model, { ...want.spec.view, roll: 0 })
      const data = await fieldOn(studio.pool, medium, view, tolerance)
      const integral = await integralOf(model, data, want.spec.aperture * model.scene.distance, tolerance, studio)
      if (!integral) return false
      writeFlux(model, directFlux(model, light, view, want.spec.aperture * model.scene.distance), integral, want)
      onDone(1, 1)
    }
    Object.assign(progress, { want: progress.want + 1, tasks: 0, placing: 0 })
    if (progress.want < wanted.length) ledger.offer(name, piece)
  }
  return true
}

/** The light in an aperture; undefined when it was stopped. */
async function integralOf(
  model: Model,
  data: FieldData,
  radius: number,
  tolerance: number,
  { pool, stop }: Studio
): Promise<PatchIntegral | undefined> {
  const input = { data, radius, tolerance, mirrored: mirrored(model) }
  return (await pool.ask({ name: 'aperture', input }, stop)) as PatchIntegral | undefined
}

function writeFlux(
  { scene: { distance } }: Model,
  direct: number,
  integral: PatchIntegral,
  { result, k, spec }: Extract<Wanted, { kind: 'spectrum' }>
): void {
  const area = distance * distance
  result.direct[k] = direct / area
  result.emitted[k] = integral.value[EMITTED] / area
  result.scattered[k] = integral.value[SCATTERED] / area
  result.sigma[k] = standardError(integral.value.subarray(FIRST_GROUP, RAY_VALUES)) / area
  result.total[k] = result.direct[k] + result.emitted[k] + result.scattered[k]
  if (result.stokes && integral.value.length > RAY_VALUES) {
    const flux = integral.value.map((value) => value / area)
    turnStokes(flux, Math.cos(2 * spec.view.roll), Math.sin(2 * spec.view.roll), true)
    putStokes(result.stokes, k, flux, 1)
  }
  const dust = integral.value[EMITTED] + integral.value[SCATTERED]
  result.samplingError[k] = dust > 0 ? integral.error / (area * result.total[k]) : 0
}

interface PictureWork {
  data: FieldData
  want: Extract<Wanted, { kind: 'camera' }>
  tolerance: number
  progress: Progress
  piece: () => Piece
  onDone: (done: number, of: number) => void
}

/** Makes the rows of a picture that are left, without the direct light of stars. */
async function takePicture(model: Model, work: PictureWork, { pool, ledger, name, stop }: Studio): Promise<boolean> {
  const { data, want, tolerance, progress, piece, onDone } = work
  const { spec, images, k } = want
  const { width, height } = images
  const frame = pixelFrame(spec, model.scene.distance)
  // Pixels a hundred times fainter than the mean need no finer rays.
  const floor = 0.01 * (await surveyOn(pool, data, frame)).mean
  if (!isFromPlace(spec.view)) images.beyond[k] = await surveyBeyondOn(pool, data, frame)
  const tasks = []
  for (let from = 0; from < height; from += ROWS_A_TASK) {
    const to = Math.min(height, from + ROWS_A_TASK)
    tasks.push({
      name: 'rows',
      scope: name,
      input: { frame, from, to, tolerance, floor, mirrored: mirrored(model) && !isFromPlace(spec.view) && spec.view.roll === 0 }
    })
  }
  const take = (output: unknown, index: number) => {
    const rows = output as PictureRows
    const at = (k * height + index * ROWS_A_TASK) * width
    images.emitted.set(rows.emitted, at)
    images.scattered.set(rows.scattered, at)
    images.sigma.set(rows.sigma, at)
    for (let g = 0; g < GROUPS; g++)
      images.modes.set(
        rows.modes.subarray(g * rows.sigma.length, (g + 1) * rows.sigma.length),
        ((k * GROUPS + g) * height + index * ROWS_A_TASK) * width
      )
    if (images.stokes && rows.stokes) for (const plane of STOKES) images.stokes[plane].set(rows.stokes[plane], at)
    progress.placing += rows.placingError
    progress.tasks = index + 1
    onDone(Math.min(height, progress.tasks * ROWS_A_TASK), height)
  }
  pool.share('field', data, name)
  const complete = await runKept({ tasks, done: progress.tasks, take, name, piece }, pool, ledger, stop)
  pool.forget('field', name)
  return complete
}
