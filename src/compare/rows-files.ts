import { type EcsvColumn, ecsv } from '../output/ecsv.js'
import { version } from '../output/version.js'
import { fluxUnit, fluxUnits } from '../units/flux.js'
import { intensityUnit } from '../units/intensity.js'
import { residual, type Values } from './goodness.js'
import { type ModelPoint, modelPlot } from './model-plot.js'
import type { ComparedSet, ShownRows } from './sets/compared-set.js'

/** A value with its model, in the unit of the data. */
interface Row {
  data: number
  sigma: number
  model: number
  modelSigma: number
  residual: number
  limit: boolean
}

/** Values and errors in the unit of the data (1 sigma of magnitudes in magnitudes), with residuals over sigma. */
function rowsOf({ data }: ComparedSet, model: Values, { inUnit, sigmaInUnit }: ShownRows, rows: number): Row[] {
  return Array.from(data.values, (value, i) => {
    const limit = data.limit?.[i] === 1
    return {
      data: inUnit(value, i % rows),
      sigma: sigmaInUnit(value, data.sigma[i], i % rows),
      model: inUnit(model.values[i], i % rows),
      modelSigma: sigmaInUnit(model.values[i], model.sigma[i], i % rows),
      residual: residual(value, model.values[i], Math.hypot(data.sigma[i], model.sigma[i]), limit),
      limit
    }
  })
}

/** The ECSV file of a data set that is a table: data, model and residuals. */
export function rowsEcsv(set: ComparedSet, shown: ShownRows, model: Values, title: string): string {
  const count = shown.axis.values.length
  const rows = rowsOf(set, model, shown, count)
  const parts: [string, string, Row[]][] = shown.complex
    ? [
        ['_re', 'real part: ', rows.slice(0, count)],
        ['_im', 'imaginary part: ', rows.slice(count)]
      ]
    : [['', '', rows]]
  const unit = fluxUnits.map(fluxUnit).find(({ name }) => name === shown.unit)?.fits ?? intensityUnit(shown.unit).fits
  const column = (key: Exclude<keyof Row, 'limit'>, name: string, description: string, bare = false) =>
    parts.map(
      ([end, part, of]): EcsvColumn => ({
        name: `${name}${end}`,
        ...(!bare && { unit }),
        description: `${part}${description}`,
        values: of.map((row) => row[key])
      })
    )
  return ecsv(
    [
      ...shown.columns,
      ...column('data', 'data', 'measured'),
      ...column('sigma', 'sigma', '1 sigma of the data'),
      ...column('model', 'model', 'of the run, with what was fitted'),
      ...column('modelSigma', 'model_sigma', '1 sigma of the Monte Carlo part of the run'),
      ...column('residual', 'residual', '(data - model) over the 1 sigma of both', true),
      ...(set.data.limit && Array.from(set.data.limit).includes(1)
        ? [
            {
              name: 'limit',
              description: '1: data is an upper limit',
              kind: 'integer' as const,
              values: rows.map(({ limit }) => Number(limit))
            }
          ]
        : [])
    ],
    { origin: `motelight ${version}`, title, data_set: set.spec.name }
  )
}

/** The plot (PNG) of a data set that is a table: data with their errors, the model, and residuals below. */
export function rowsPlot(set: ComparedSet, shown: ShownRows, model: Values, factor: number, title: string): Promise<Uint8Array> {
  const { axis, unit, quantity } = shown
  const count = axis.values.length
  const rows = rowsOf(set, model, shown, count)
  const points = shown.complex ? amplitudes(rows, axis.values) : rows.map((row, i): ModelPoint => ({ x: axis.values[i], ...row }))
  const line = shown.complex ? [] : (shown.line?.(factor) ?? points.map(({ x, model: y }) => ({ x, y })))
  const detail = shown.complex ? 'residuals of the real part (filled) and the imaginary part (open)' : set.spec.kind
  return modelPlot({ title, subtitle: `${set.spec.name} · ${detail}`, panels: [{ axis, unit, quantity, points, line }] })
}

/** Amplitudes of real parts followed by as many imaginary ones, with the residuals of both. */
function amplitudes(rows: Row[], at: number[]): ModelPoint[] {
  const count = at.length
  return at.map((x, i) => {
    const [re, im] = [rows[i], rows[count + i]]
    return {
      x,
      data: Math.hypot(re.data, im.data),
      sigma: re.sigma,
      model: Math.hypot(re.model, im.model),
      limit: false,
      residual: re.residual,
      second: im.residual
    }
  })
}
