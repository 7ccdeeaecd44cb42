import { integrateAperture } from '../camera/aperture.js'
import { addDirectLight, directLight, starImage } from '../camera/direct.js'
import { pixelFrame, seenFrom } from '../camera/frame.js'
import type { PatchIntegral } from '../camera/patch.js'
import { RadialProfile } from '../camera/profile.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, RayIntegrator, SCATTERED } from '../camera/ray.js'
import { type FieldData, fieldData, openField } from '../camera/ray-field.js'
import { type RayMedium, rayMedium } from '../camera/ray-medium.js'
import type { PictureRows } from '../camera/rows.js'
import { survey, surveyAperture } from '../camera/survey.js'
import type { ApertureSpectrum, CameraImages } from '../camera/types.js'
import type { ViewBasis } from '../camera/view.js'
import { standardError } from '../math/stats.js'
import type { Model } from '../model/model.js'
import type { CameraSpec, SpectrumSpec } from '../scene/types.js'
import type { DustLight } from '../solve/dust-light.js'
import type { ScatteredLight } from '../solve/scattered-light.js'
import type { WorkerPool } from '../workers/pool.js'

/** A camera or spectrum that wants the wavelength at hand, and the index of the wavelength in its list. */
export type Wanted =
  | { kind: 'camera'; spec: CameraSpec; images: CameraImages; k: number }
  | { kind: 'spectrum'; spec: SpectrumSpec; result: ApertureSpectrum; k: number }

/** The different directions from which the wanted are seen, as solveScattering takes them, and which of them each one uses. */
export function observersOf(model: Model, wanted: Wanted[]): { observers: Float64Array; indices: number[] } {
  const keys: string[] = []
  const vectors: number[] = []
  const indices = wanted.map(({ spec }) => {
    const { observer } = seenFrom(model, spec.view)
    const key = observer.join(' ')
    if (!keys.includes(key)) {
      keys.push(key)
      vectors.push(...observer)
    }
    return keys.indexOf(key)
  })
  return { observers: Float64Array.from(vectors), indices }
}

/** Rays to a radius are seen through a mirror where the cells are symmetric about the plane of the observer and the axis. */
const mirrored = (model: Model) => model.dimensions < 3

/** Relative accuracy with which rays are placed: a tenth of the precision asked for, or of 1 %. */
function placingTolerance(model: Model): number {
  return 0.1 * (model.scene.effort.precision ?? 0.01)
}

function mediumFor(model: Model, light: DustLight, scattered: ScatteredLight[], index: number): RayMedium {
  return rayMedium(model, light, scattered.length === 0 ? undefined : scattered[model.dimensions === 1 ? 0 : index])
}

/** Largest relative error among the wanted, of scattered light alone or of all light, by a quick look. */
export function quickError(
  model: Model,
  light: DustLight,
  scattered: ScatteredLight[],
  wanted: Wanted[],
  indices: number[],
  part: 'scattered' | 'all'
): number {
  let worst = 0
  wanted.forEach((want, i) => {
    const medium = mediumFor(model, light, scattered, indices[i])
    if (part === 'scattered') medium.emissionGroups = new Float32Array()
    const view = seenFrom(model, want.spec.view)
    const field = openField(fieldData(medium, view, 0.01))
    const { distance } = model.scene
    if (want.kind === 'camera') worst = Math.max(worst, survey(field, pixelFrame(want.spec, distance)).error)
    else {
      const value = surveyAperture(field, want.spec.aperture * distance)
      const direct = directFlux(model, light, medium, view, want.spec.aperture * distance)
      const total = value[EMITTED] + value[SCATTERED] + direct
      if (total > 0) worst = Math.max(worst, standardError(value.subarray(FIRST_GROUP, RAY_VALUES)) / total)
    }
  })
  return worst
}

function apertureOf(field: ReturnType<typeof openField>, radius: number, tolerance: number, mirror: boolean): PatchIntegral {
  if (field instanceof RadialProfile) return { value: field.integrate(radius), error: 0 }
  return integrateAperture(field, radius, tolerance, mirror)
}

/** Direct light of all stars within a radius, luminosity per sr (erg/s/Hz/sr). */
function directFlux(model: Model, light: DustLight, medium: RayMedium, view: ViewBasis, radius: number): number {
  const depthAt = depthTo(medium, view)
  return model.stars.reduce(
    (sum, { spec, spectrum }) => sum + directLight(starImage(spec, spectrum, light.nu), depthAt, radius),
    0
  )
}

/** Optical depth from the observer to the star at the centre. */
export function depthTo(medium: RayMedium, view: ViewBasis): (x: number, y: number) => number {
  const integrator = new RayIntegrator({ ...medium, slots: 0, starlight: undefined }, view)
  return (x, y) => integrator.depthToOrigin(x, y)
}

const ROWS_A_TASK = 8

/** Makes the pictures and fluxes of everything wanted at one wavelength. */
export async function observeWavelength(
  model: Model,
  light: DustLight,
  scattered: ScatteredLight[],
  wanted: Wanted[],
  indices: number[],
  pool: WorkerPool,
  onDone: (observer: { kind: Wanted['kind']; name: string }, done: number, of: number) => void,
  stop: AbortSignal | undefined
): Promise<void> {
  const tolerance = placingTolerance(model)
  const { distance } = model.scene
  for (const [i, want] of wanted.entries()) {
    const medium = mediumFor(model, light, scattered, indices[i])
    const view = seenFrom(model, want.kind === 'spectrum' ? { ...want.spec.view, roll: 0 } : want.spec.view)
    const data = fieldData(medium, view, tolerance)
    const observer = { kind: want.kind, name: want.spec.name }
    if (want.kind === 'camera') {
      await takePicture(model, light, medium, view, data, want, pool, tolerance, (done, of) => onDone(observer, done, of), stop)
    } else {
      const radius = want.spec.aperture * distance
      let integral: PatchIntegral
      if (data.kind === 'profile') integral = apertureOf(openField(data), radius, tolerance, true)
      else {
        pool.share('field', data)
        const tasks = [{ name: 'aperture', input: { radius, tolerance, mirrored: mirrored(model) } }]
        integral = { value: new Float64Array(RAY_VALUES), error: 0 }
        await pool.run(
          tasks,
          (output) => {
            integral = output as PatchIntegral
          },
          stop
        )
        pool.forget('field')
      }
      const { result, k } = want
      const area = distance * distance
      result.direct[k] = directFlux(model, light, medium, view, radius) / area
      result.emitted[k] = integral.value[EMITTED] / area
      result.scattered[k] = integral.value[SCATTERED] / area
      result.sigma[k] = standardError(integral.value.subarray(FIRST_GROUP, RAY_VALUES)) / area
      result.total[k] = result.direct[k] + result.emitted[k] + result.scattered[k]
      const dust = integral.value[EMITTED] + integral.value[SCATTERED]
      result.samplingError[k] = dust > 0 ? integral.error / (area * result.total[k]) : 0
      onDone(observer, 1, 1)
    }
  }
}

async function takePicture(
  model: Model,
  light: DustLight,
  medium: RayMedium,
  view: ViewBasis,
  data: FieldData,
  { spec, images, k }: Extract<Wanted, { kind: 'camera' }>,
  pool: WorkerPool,
  tolerance: number,
  onRows: (done: number, of: number) => void,
  stop: AbortSignal | undefined
): Promise<void> {
  const frame = pixelFrame(spec, model.scene.distance)
  // Pixels a hundred times fainter than the mean need no finer rays.
  const floor = 0.01 * survey(openField(data), frame).mean
  const tasks = []
  for (let from = 0; from < frame.height; from += ROWS_A_TASK) {
    const to = Math.min(frame.height, from + ROWS_A_TASK)
    tasks.push({ name: 'rows', input: { frame, from, to, tolerance, floor, mirrored: mirrored(model) && spec.view.roll === 0 } })
  }
  const offset = k * frame.width * frame.height
  let placing = 0
  pool.share('field', data)
  await pool.run(
    tasks,
    (output, index) => {
      const rows = output as PictureRows
      const at = offset + index * ROWS_A_TASK * frame.width
      images.emitted.set(rows.emitted, at)
      images.scattered.set(rows.scattered, at)
      images.sigma.set(rows.sigma, at)
      placing += rows.placingError
      onRows(Math.min(frame.height, (index + 1) * ROWS_A_TASK), frame.height)
    },
    stop
  )
  pool.forget('field')
  const direct = images.direct.subarray(offset, offset + frame.width * frame.height)
  const depthAt = depthTo(medium, view)
  for (const { spec: star, spectrum } of model.stars) addDirectLight(starImage(star, spectrum, light.nu), depthAt, frame, direct)
  let sum = 0
  for (let i = 0; i < direct.length; i++) {
    const at = offset + i
    images.total[at] = images.direct[at] + images.emitted[at] + images.scattered[at]
    sum += images.total[at]
  }
  images.samplingError[k] = sum > 0 ? placing / sum : 0
}
