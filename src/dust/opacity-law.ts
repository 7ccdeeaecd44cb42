import { interpolateLinear, interpolateLogLog } from '../math/interp.js'
import type { OpacitySpec, OpacityTable, PhaseLaw, PowerOpacitySpec } from '../scene/types.js'
import type { ScatteringMatrix } from './scattering-matrix.js'

/** Optical properties of one kind of dust as functions of wavelength (cm). */
export interface OpacityLaw {
  /** Absorption opacity, cm2 per gram of dust. */
  absorption: (wavelength: number) => number
  /** Scattering opacity, cm2 per gram of dust. */
  scattering: (wavelength: number) => number
  /** Mean cosine of the scattering angle; 0 at every wavelength when scattering is isotropic. */
  asymmetry: (wavelength: number) => number
  phase: PhaseLaw
  /** Scattering matrix at a wavelength, of a law whose light is followed with its polarisation. */
  matrix?: (wavelength: number) => ScatteringMatrix
  /** Wavelengths (cm) between which the law is given; beyond them it is extrapolated. */
  range: [number, number]
  /** Wavelengths (cm, increasing) where a curve bends sharply. */
  kinks: number[]
}

/** The law a scene asks for, as the scene format defines it. */
export function makeOpacityLaw(spec: OpacitySpec): OpacityLaw {
  const law = spec.law === 'power' ? powerLaw(spec) : tableLaw(spec.table)
  return { ...law, phase: spec.phase, asymmetry: spec.phase === 'isotropic' ? () => 0 : law.asymmetry }
}

function powerLaw(spec: PowerOpacitySpec): Omit<OpacityLaw, 'phase'> {
  const { reference, slope, scattering } = spec
  const absorption = (wavelength: number) => reference.absorption * (wavelength / reference.wavelength) ** -slope
  const ratio = scattering.albedo / (1 - scattering.albedo)
  const scatteringSlope = scattering.slope ?? slope
  return {
    absorption,
    scattering: (wavelength) => ratio * reference.absorption * (wavelength / reference.wavelength) ** -scatteringSlope,
    asymmetry: () => scattering.asymmetry,
    range: [0, Number.POSITIVE_INFINITY],
    kinks: []
  }
}

function tableLaw(table: OpacityTable): Omit<OpacityLaw, 'phase'> {
  const { wavelength: rows, absorption, scattering, asymmetry } = table
  const lnRows = rows.map(Math.log)
  return {
    absorption: (wavelength) => tabulated(rows, absorption, wavelength),
    scattering: (wavelength) => tabulated(rows, scattering, wavelength),
    asymmetry: (wavelength) => interpolateLinear(lnRows, asymmetry, Math.log(wavelength)),
    range: [rows[0], rows[rows.length - 1]],
    kinks: Array.from(rows.filter((_, i) => isKink(rows, absorption, i) || isKink(rows, scattering, i)))
  }
}

/** Log-log interpolation; constant below the first row, the power law of the last two rows beyond the last. */
function tabulated(rows: Float64Array, values: Float64Array, wavelength: number): number {
  const last = rows.length - 1
  if (wavelength <= rows[last] || last === 0) return interpolateLogLog(rows, values, wavelength)
  if (values[last] === 0 || values[last - 1] === 0) return values[last]
  return values[last] * (wavelength / rows[last]) ** logSlope(rows, values, last - 1)
}

/** d ln value / d ln wavelength from row i to the next; infinite from or to a zero. */
function logSlope(rows: Float64Array, values: Float64Array, i: number): number {
  return values[i] === values[i + 1] ? 0 : Math.log(values[i + 1] / values[i]) / Math.log(rows[i + 1] / rows[i])
}

/** A bend of the logarithmic slope by more than one half, or an interval from or to a zero on either side. */
function isKink(rows: Float64Array, values: Float64Array, i: number): boolean {
  if (i === rows.length - 1) return false
  const before = i === 0 ? 0 : logSlope(rows, values, i - 1)
  return !(Math.abs(logSlope(rows, values, i) - before) <= 0.5)
}
