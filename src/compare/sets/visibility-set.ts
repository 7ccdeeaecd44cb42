import { numbersIn } from '../../data/table.js'
import { extent } from '../../math/stats.js'
import type { LightWeights } from '../../observe/band.js'
import { NYQUIST, type Refuse } from '../../observe/observe-run.js'
import type { CameraSource } from '../../observe/run-source.js'
import { modelVisibilities } from '../../observe/visibilities.js'
import { LIGHT_SPEED } from '../../units/constants.js'
import type { VisibilityData } from '../types.js'
import { angleUnits, columnIn, errorsOf, fluxUnitOf, lengthUnits } from './columns.js'
import type { ComparedSet, Placement } from './compared-set.js'

/**
 * Visibilities with the camera that sees the same: real and imaginary parts (all real ones first), or amplitudes where the table has no
 * phases. Columns east, north, amplitude, phase and the 1 sigma of each part.
 */
export function visibilitySet(spec: VisibilityData, source: CameraSource, light: LightWeights, refuse: Refuse): ComparedSet {
  const { table } = spec
  const [east, north] = ['east', 'north'].map((name) => columnIn(table, name, lengthUnits, refuse))
  const context = { frequencyHz: LIGHT_SPEED / light.wavelength }
  const unit = fluxUnitOf(table, 'amplitude', refuse)
  const inCgs = (name: string, values: Float64Array) => {
    const { name: written, toCgs } = fluxUnitOf(table, name, refuse)
    if (written === 'mag') refuse('file', `${table.file}: ${name} must not be in magnitudes`)
    return values.map((value) => toCgs(value, context))
  }
  const amplitude = inCgs('amplitude', numbersIn(table, 'amplitude').values)
  const errors = inCgs(spec.errors, errorsOf(table, spec.errors, refuse))
  const withPhase = table.columns.has('phase')
  const phase = withPhase ? columnIn(table, 'phase', angleUnits, refuse) : new Float64Array(amplitude.length)
  const rows = Array.from(amplitude.keys()).filter((i) =>
    [amplitude, errors, phase, east, north].every((column) => Number.isFinite(column[i]))
  )
  if (rows.length === 0) refuse('file', 'no row holds a whole visibility with its 1 sigma')
  const baselines = rows.map((i): [number, number] => [east[i], north[i]])
  const [, longest] = extent(baselines.map(([x, y]) => Math.hypot(x, y)))
  if ((longest / light.wavelength) * Math.max(...source.pixel) > NYQUIST)
    refuse('file', 'the pixels of the camera hide what the longest baseline sees; the run needs smaller pixels')
  const parts = (of: (i: number) => [number, number]) =>
    Float64Array.from([...rows.map((i) => of(i)[0]), ...(withPhase ? rows.map((i) => of(i)[1]) : [])])
  return {
    spec,
    data: {
      values: parts((i) => [amplitude[i] * Math.cos(phase[i]), amplitude[i] * Math.sin(phase[i])]),
      sigma: parts((i) => [errors[i], errors[i]])
    },
    independent: 1,
    step: longest > 0 ? (0.01 * light.wavelength) / longest : Math.max(...source.pixel),
    // In a band, an offset would turn the phase by another angle at each wavelength.
    scalings: withPhase && spec.light.kind === 'line' ? ['flux', 'centre', 'rotation'] : ['flux', 'rotation'],
    leftOut: { blank: amplitude.length - rows.length },
    warnings: [],
    wavelength: light.wavelength,
    model: (placement) => modelOf(placement, baselines, source, light, withPhase),
    shown: {
      kind: 'rows',
      columns: ['east', 'north'].map((name, axis) => ({
        name,
        unit: 'm',
        description: 'projected baseline',
        values: baselines.map((baseline) => baseline[axis] / 100)
      })),
      axis: {
        title: 'projected baseline (m)',
        values: baselines.map(([x, y]) => Math.hypot(x, y) / 100),
        logarithmic: false
      },
      unit: unit.name,
      quantity: 'amplitude',
      inUnit: (value) => unit.fromCgs(value, context),
      sigmaInUnit: (value, sigma) => unit.sigmaFromCgs(value, sigma, context),
      ...(withPhase && { complex: true as const })
    }
  }
}

/** A turn of the source is one of the baselines backwards; an offset turns the phase of each. */
function modelOf(
  { east, north, rotation }: Placement,
  baselines: [number, number][],
  source: CameraSource,
  light: LightWeights,
  withPhase: boolean
) {
  const [sin, cos] = [Math.sin(rotation), Math.cos(rotation)]
  const turned = baselines.map(([x, y]): [number, number] => [x * cos - y * sin, y * cos + x * sin])
  const { expected, sigma } = modelVisibilities(turned, source, light.weights)
  const count = baselines.length
  if (!withPhase) return { values: expected.re.map((re, i) => Math.hypot(re, expected.im[i])), sigma }
  const values = new Float64Array(2 * count)
  const errors = new Float64Array(2 * count)
  for (let i = 0; i < count; i++) {
    const angle = (-2 * Math.PI * (baselines[i][0] * east + baselines[i][1] * north)) / light.wavelength
    const [re, im] = [expected.re[i], expected.im[i]]
    values[i] = re * Math.cos(angle) - im * Math.sin(angle)
    values[count + i] = re * Math.sin(angle) + im * Math.cos(angle)
    errors[i] = errors[count + i] = sigma[i]
  }
  return { values, sigma: errors }
}
