import { standardError } from '../math/stats.js'
import { GROUPS } from '../solve/groups.js'
import type { IntensityField } from './field.js'
import type { PixelFrame } from './frame.js'
import { putModes } from './noise-modes.js'
import { PixelIntegrator } from './pixel.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, SCATTERED } from './ray-values.js'
import { putStokes, type StokesPlanes, stokesPlanes } from './stokes-planes.js'

/** Rows of a picture without direct starlight; erg/s/cm2/Hz/sr, width x number of rows, lowest row first. */
export interface PictureRows {
  emitted: Float64Array
  scattered: Float64Array
  sigma: Float64Array
  /** GROUPS x as many values: see CameraImages. */
  modes: Int8Array
  /** Where light is polarised. */
  stokes?: StokesPlanes
  /** Sum over the pixels of the estimated error of placing the rays. */
  placingError: number
}

/**
 * Integrates the pixels of rows `from` up to, not including, `to`. `tolerance` and `floor`: see PixelIntegrator. `mirrored`: the
 * right half of the picture equals the left one, and only one is traced.
 */
export function pictureRows(
  field: IntensityField,
  frame: PixelFrame,
  from: number,
  to: number,
  tolerance: number,
  floor: number,
  mirrored: boolean
): PictureRows {
  const { columns } = frame
  const width = columns.length - 1
  const count = width * (to - from)
  const rows: PictureRows = {
    emitted: new Float64Array(count),
    scattered: new Float64Array(count),
    sigma: new Float64Array(count),
    modes: new Int8Array(GROUPS * count),
    ...(field.size > RAY_VALUES && { stokes: stokesPlanes(count) }),
    placingError: 0
  }
  const integrator = new PixelIntegrator(field, tolerance, floor)
  const traced = mirrored ? Math.ceil(width / 2) : width
  for (let row = from; row < to; row++) {
    const [low, high] = frame.rows.subarray(row, row + 2)
    const start = (row - from) * width
    for (let column = 0; column < traced; column++) {
      const [left, right] = columns.subarray(column, column + 2)
      integrator.integrate(0.5 * (left + right), 0.5 * (low + high), right - left, high - low)
      const groups = integrator.mean.subarray(FIRST_GROUP, RAY_VALUES)
      const sigma = standardError(groups)
      const twin = width - 1 - column
      for (const at of mirrored && twin !== column ? [start + column, start + twin] : [start + column]) {
        rows.emitted[at] = integrator.mean[EMITTED]
        rows.scattered[at] = integrator.mean[SCATTERED]
        rows.sigma[at] = sigma
        putModes(rows.modes, at, count, groups, sigma)
        if (rows.stokes) putStokes(rows.stokes, at, integrator.mean, at === start + column ? 1 : -1)
        rows.placingError += integrator.error
      }
    }
  }
  return rows
}
