import { numbersIn } from '../../data/table.js'
import type { LightWeights } from '../../observe/band.js'
import { makeBeam } from '../../observe/beam.js'
import { sigmaOf } from '../../observe/noise-planes.js'
import type { Refuse } from '../../observe/observe-run.js'
import { throughOptics } from '../../observe/optics.js'
import type { CameraSource } from '../../observe/run-source.js'
import { pictureUnit } from '../../observe/unit.js'
import { ARCSECOND, DEGREE } from '../../units/angles.js'
import { LIGHT_SPEED } from '../../units/constants.js'
import { type BinOf, rings, sectors } from '../profile.js'
import type { ProfileData } from '../types.js'
import { angleUnits, columnIn, errorsOf, intensityUnitOf } from './columns.js'
import type { ComparedSet } from './compared-set.js'

/** Parts of a side of a pixel when it is shared among rings or sectors. */
const PARTS = 5

/**
 * A measured profile with that of a camera: means over rings that reach half-way to the neighbouring radii, or over sectors that reach
 * half-way to the neighbouring position angles. Columns radius or angle, intensity, and its 1 sigma.
 */
export function profileSet(spec: ProfileData, source: CameraSource, light: LightWeights, refuse: Refuse): ComparedSet {
  const { table, along } = spec
  const all = columnIn(table, along, angleUnits, refuse)
  const given = numbersIn(table, 'intensity').values
  const errors = errorsOf(table, spec.errors, refuse)
  const rows = Array.from(all.keys()).filter((i) => [all, given, errors].every((column) => Number.isFinite(column[i])))
  if (rows.length < 2) refuse('file', 'at least two rows with a whole value and its 1 sigma are expected')
  if (rows.some((row, i) => i > 0 && !(all[row] > all[rows[i - 1]]))) refuse('file', `the rows must be in order of ${along}`)
  if (along === 'radius' && all[rows[0]] < 0) refuse('file', 'a radius must not be negative')
  const at = rows.map((row) => all[row])
  const beam = spec.beam && makeBeam(spec.beam, light.wavelength)
  const unit = pictureUnit(intensityUnitOf(table, 'intensity', refuse).name, spec.zeroMagnitude)
  const errorUnit = intensityUnitOf(table, spec.errors, refuse)
  const magnitudes = unit.name.startsWith('mag')
  if (magnitudes !== errorUnit.name.startsWith('mag'))
    refuse('errors', 'intensity and its 1 sigma must both be magnitudes, or neither')
  if (!beam && unit.name.endsWith('/beam')) refuse('beam', 'the profile is in flux a beam; the `beam` is missing')
  const context = {
    frequencyHz: LIGHT_SPEED / light.wavelength,
    pixelSr: source.pixel[0] * source.pixel[1],
    ...(beam && { beamSr: beam.solidAngle })
  }
  const values = Float64Array.from(rows, (row) => unit.toCgs(given[row], context))
  const seen = throughOptics(spec, source, light, source)
  const model = binned(seen, source, along === 'radius' ? rings(edgesOf(at)) : sectors(at, spec.between!), rows.length)
  const empty = model.values.findIndex(Number.isNaN)
  if (empty >= 0) refuse('file', `the camera ${source.name} shows nothing at row ${rows[empty] + 1}: it is outside its field`)
  const shownIn = along === 'radius' ? ARCSECOND : DEGREE
  return {
    spec,
    data: {
      values,
      sigma: Float64Array.from(rows, (row, i) => errorUnit.sigmaToCgs(values[i], errors[row], context))
    },
    independent: 1,
    step: 1,
    scalings: ['flux'],
    leftOut: { blank: all.length - rows.length },
    warnings: [],
    wavelength: light.wavelength,
    model: () => model,
    shown: {
      kind: 'rows',
      columns: [
        {
          name: along,
          unit: along === 'radius' ? 'arcsec' : 'deg',
          description: along === 'radius' ? 'of the ring' : 'from north towards east',
          values: at.map((value) => value / shownIn)
        }
      ],
      axis: {
        title: along === 'radius' ? 'radius (arcsec)' : 'position angle (°)',
        values: at.map((value) => value / shownIn),
        logarithmic: false
      },
      unit: unit.name,
      quantity: magnitudes ? 'surface brightness' : 'specific intensity',
      inUnit: (value) => unit.fromCgs(value, context),
      sigmaInUnit: (value, sigma) => unit.sigmaFromCgs(value, sigma, context)
    }
  }
}

/** Half-way between neighbours; the first ring reaches as far inwards as outwards, but not past the centre. */
function edgesOf(at: number[]): number[] {
  const middles = at.slice(1).map((value, i) => 0.5 * (value + at[i]))
  const [first, last] = [at[0], at[at.length - 1]]
  return [Math.max(0, 2 * first - middles[0]), ...middles, 2 * last - middles[middles.length - 1]]
}

/** Means of a picture in bins, each pixel shared by its parts. */
function binned(
  { image, noise }: { image: Float64Array; noise: Float64Array[] },
  { width, height, pixel }: CameraSource,
  binOf: BinOf,
  bins: number
) {
  const planes = [image, ...noise]
  const sums = planes.map(() => new Float64Array(bins))
  const count = new Float64Array(bins)
  for (let i = 0; i < width * height; i++) {
    for (let part = 0; part < PARTS * PARTS; part++) {
      const x = (i % width) + ((part % PARTS) + 0.5) / PARTS
      const y = Math.floor(i / width) + (Math.floor(part / PARTS) + 0.5) / PARTS
      const bin = binOf((width / 2 - x) * pixel[0], (y - height / 2) * pixel[1])
      if (bin < 0) continue
      planes.forEach((plane, p) => {
        sums[p][bin] += plane[i]
      })
      count[bin]++
    }
  }
  const [values, ...deviations] = sums.map((sum) => sum.map((value, bin) => value / count[bin]))
  return { values, sigma: sigmaOf(deviations) }
}
