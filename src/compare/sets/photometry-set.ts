import { numbersIn } from '../../data/table.js'
import { bracket } from '../../math/interp.js'
import { extent } from '../../math/stats.js'
import { inLight, interpolationError, LightError, lightWeights, MOST_BAND_ERROR } from '../../observe/band.js'
import type { Refuse } from '../../observe/observe-run.js'
import type { SpectrumSource } from '../../observe/run-source.js'
import { photometryUnit } from '../../observe/unit.js'
import { wavelengthLabel } from '../../output/wavelength-label.js'
import { LIGHT_SPEED } from '../../units/constants.js'
import type { PhotometryData } from '../types.js'
import { errorsOf, fluxUnitOf, limitsOf, textsOf, wavelengthsIn } from './columns.js'
import type { ComparedSet } from './compared-set.js'

const label = (wavelength: number) => wavelengthLabel(wavelength, 6)

/** Measured fluxes with the spectrum that they are of. */
export function photometrySet(spec: PhotometryData, source: SpectrumSource, refuse: Refuse): ComparedSet {
  const { table } = spec
  const wavelengths = wavelengthsIn(table, refuse)
  const names = textsOf(table, 'name')
  for (const band of spec.bands.keys())
    if (!names?.includes(band)) refuse('bands', `the table has no row with the name ${band} in a column \`name\``)
  const { values: given } = numbersIn(table, 'flux')
  const unit = photometryUnit(fluxUnitOf(table, 'flux', refuse).name, spec.zeroMagnitude)
  const errors = errorsOf(table, spec.errors, refuse)
  const errorUnit = fluxUnitOf(table, spec.errors, refuse)
  const magnitudes = unit.name === 'mag'
  if (magnitudes !== (errorUnit.name === 'mag')) refuse('errors', 'flux and its 1 sigma must both be magnitudes, or neither')
  const limit = limitsOf(table, given.length, refuse)
  const rows = Array.from(given.keys()).filter((row) => Number.isFinite(given[row]) && Number.isFinite(errors[row]))
  if (rows.length === 0) refuse('file', 'no row holds both a flux and its 1 sigma')
  const made = rows.map((row) => rowOf(spec, source, wavelengths[row], names?.[row], row, refuse))
  const context = (row: number) => ({ frequencyHz: LIGHT_SPEED / made[row].wavelength })
  const values = Float64Array.from(rows, (row, i) => unit.toCgs(given[row], context(i)))
  const sigma = Float64Array.from(rows, (row, i) => errorUnit.sigmaToCgs(values[i], errors[row], context(i)))
  const of = (parts: Float64Array) => Float64Array.from(made, (light) => inLight(light, parts))
  const model = { values: of(source.total), sigma: of(source.sigma) }
  const [, worst] = extent(made.map((light) => interpolationError(light, source.total)))
  return {
    spec,
    data: { values, sigma, limit: Uint8Array.from(rows, (row) => limit[row]) },
    independent: 1,
    step: 1,
    scalings: ['flux'],
    leftOut: { blank: given.length - rows.length },
    warnings:
      worst > MOST_BAND_ERROR
        ? [
            `${spec.name}: the wavelengths of the spectrum ${source.name} are few; interpolating between them costs up to ${Number((100 * worst).toPrecision(2))} %`
          ]
        : [],
    model: () => model,
    shown: {
      kind: 'rows',
      columns: [
        ...(names ? [{ name: 'name', description: 'as in the data', values: rows.map((row) => names[row]) }] : []),
        {
          name: 'wavelength',
          unit: 'um',
          description: 'pivot of a band',
          values: made.map(({ wavelength }) => Number((wavelength * 1e4).toPrecision(15)))
        }
      ],
      axis: { title: 'wavelength (µm)', values: made.map(({ wavelength }) => wavelength * 1e4), logarithmic: true },
      unit: unit.name,
      quantity: magnitudes ? 'magnitude' : 'flux density',
      inUnit: (value, row) => unit.fromCgs(value, context(row)),
      sigmaInUnit: (value, sigma, row) => unit.sigmaFromCgs(value, sigma, context(row)),
      line: (factor) =>
        source.wavelengths.map((wavelength, k) => ({
          x: wavelength * 1e4,
          y: unit.fromCgs(factor * source.total[k], { frequencyHz: LIGHT_SPEED / wavelength })
        }))
    }
  }
}

/** Weights of the wavelengths of the model for a row: through its band, or straight in ln(wavelength) between two of them. */
function rowOf(
  { bands, table }: PhotometryData,
  { wavelengths }: SpectrumSource,
  wavelength: number,
  name: string | undefined,
  row: number,
  refuse: Refuse
) {
  const band = name === undefined ? undefined : bands.get(name)
  if (band) {
    try {
      return lightWeights(band, wavelengths, label)
    } catch (error) {
      if (error instanceof LightError) refuse('bands', `${name}: ${error.message}`)
      throw error
    }
  }
  const [first, last] = [wavelengths[0], wavelengths[wavelengths.length - 1]]
  const slack = 1e-6
  if (wavelength < first * (1 - slack) || wavelength > last * (1 + slack))
    refuse(
      'file',
      `${table.file}: row ${row + 1}: the wavelength ${label(wavelength)} is outside the model, which reaches from ${label(first)} to ${label(last)}`
    )
  return { ...between(wavelengths, wavelength), wavelength }
}

/** The same from the neighbours of the two tells the error of interpolation. */
function between(wavelengths: number[], wavelength: number): { weights: Float64Array; coarse: Float64Array } {
  const weights = new Float64Array(wavelengths.length)
  const exact = wavelengths.findIndex((known) => Math.abs(known / wavelength - 1) < 1e-6)
  if (exact >= 0) {
    weights[exact] = 1
    return { weights, coarse: weights }
  }
  const k = bracket(wavelengths, wavelength)
  const fill = (parts: Float64Array, i: number, j: number) => {
    const share = Math.log(wavelength / wavelengths[i]) / Math.log(wavelengths[j] / wavelengths[i])
    parts[i] = 1 - share
    parts[j] = share
    return parts
  }
  const coarse = new Float64Array(wavelengths.length)
  return {
    weights: fill(weights, k, k + 1),
    coarse: fill(coarse, Math.max(0, k - 1), Math.min(wavelengths.length - 1, k + 2))
  }
}
