import { largestRadius } from '../dust/grains/make-grain.js'
import { scatteringAngles } from '../dust/grains/scattering-angles.js'
import { mixtureOptics } from '../dust/grains/tabulate-grains.js'
import { meanOpacities } from '../dust/mean-opacity.js'
import { makeOpacityLaw, type OpacityLaw } from '../dust/opacity-law.js'
import { henyeyGreenstein } from '../dust/phase-function.js'
import type { ScatteringMatrix } from '../dust/scattering-matrix.js'
import { LONGEST, SHORTEST } from '../dust/wavelength-grid.js'
import { interpolateLinear } from '../math/interp.js'
import type { GrainsOpacitySpec, OpacitySpec, Scene } from '../scene/types.js'
import { grainTables } from './grain-tables.js'
import type { RunProgress } from './progress.js'

/** Optical properties of one entry of `opacities`. Wavelengths um, opacities cm2/g, angles deg. */
export interface OpacityReport {
  name: string
  law: OpacitySpec['law']
  /** Name of the scattering law. */
  phase: string
  curves: {
    wavelengthUm: Float64Array
    absorption: Float64Array
    scattering: Float64Array
    extinction: Float64Array
    albedo: Float64Array
    asymmetry: Float64Array
  }
  scattering: ScatteringReport[]
  means: { temperatureK: Float64Array; planck: Float64Array; rosseland: Float64Array }
}

/** How light is scattered at one wavelength. */
export interface ScatteringReport {
  wavelengthUm: number
  angleDeg: Float64Array
  /** The law that a run uses: probability per sr. */
  law: Float64Array
  /** The scattering matrix, per sr, where there is one; for grains by Mie theory, whatever law the run uses. */
  matrix?: Omit<ScatteringMatrix, 'angles'>
  /** Degree of polarisation of light that was not polarised, -s12/s11; positive across the plane of scattering. */
  polarisation?: Float64Array
}

export interface OpacityRequest {
  names: string[]
  /** Where the scattering law is wanted, cm. */
  wavelengths: number[]
  workers: number
  onProgress: (progress: RunProgress) => void
}

const PER_DECADE = 40
const COLDEST = 5
const HOTTEST = 5000
const TEMPERATURES = 91

/** Reports on some opacities of a scene. */
export async function opacityReports(
  scene: Scene,
  { names, wavelengths, workers, onProgress }: OpacityRequest
): Promise<OpacityReport[]> {
  const tables = await grainTables(scene, workers, onProgress, undefined, names)
  return names.map((name) => {
    const spec = scene.opacities[name]
    const law = makeOpacityLaw(spec, tables[name])
    const rows = spec.law === 'table' ? spec.table.wavelength : (tables[name]?.wavelengths ?? [])
    const temperatureK = Float64Array.from(
      { length: TEMPERATURES },
      (_, i) => COLDEST * (HOTTEST / COLDEST) ** (i / (TEMPERATURES - 1))
    )
    return {
      name,
      law: spec.law,
      phase: typeof spec.phase === 'string' ? spec.phase : spec.phase.kind,
      curves: curvesOf(law, rows),
      scattering: wavelengths.map((wavelength, done) => {
        if (spec.law === 'grains')
          onProgress({ stage: 'grains', opacity: name, wavelength, done, of: wavelengths.length, round: 0, error: Number.NaN })
        return scatteringOf(spec, law, wavelength)
      }),
      means: { temperatureK, ...meanOpacities(law, temperatureK) }
    }
  })
}

/** The curves at even steps, and at all rows of a table. */
function curvesOf(law: OpacityLaw, rows: ArrayLike<number>): OpacityReport['curves'] {
  const steps = Math.ceil(PER_DECADE * Math.log10(LONGEST / SHORTEST))
  const even = Array.from({ length: steps + 1 }, (_, i) => SHORTEST * (LONGEST / SHORTEST) ** (i / steps))
  const wavelengths = Float64Array.from([...new Set([...even, ...Array.from(rows)])].sort((a, b) => a - b))
  const absorption = wavelengths.map(law.absorption)
  const scattering = wavelengths.map(law.scattering)
  const extinction = absorption.map((value, i) => value + scattering[i])
  return {
    wavelengthUm: wavelengths.map((wavelength) => wavelength * 1e4),
    absorption,
    scattering,
    extinction,
    albedo: scattering.map((value, i) => (extinction[i] > 0 ? value / extinction[i] : 0)),
    asymmetry: wavelengths.map(law.asymmetry)
  }
}

function scatteringOf(spec: OpacitySpec, law: OpacityLaw, wavelength: number): ScatteringReport {
  const used = law.matrix?.(wavelength)
  const exact = spec.law === 'grains' && spec.phase !== 'computed' ? mieMatrix(spec, wavelength) : used
  const angles = exact?.angles ?? Float64Array.from({ length: 181 }, (_, degree) => (degree * Math.PI) / 180)
  const g = law.asymmetry(wavelength)
  return {
    wavelengthUm: wavelength * 1e4,
    angleDeg: angles.map((angle) => (angle * 180) / Math.PI),
    law: angles.map((angle) => (used ? interpolateLinear(used.angles, used.s11, angle) : henyeyGreenstein(g, Math.cos(angle)))),
    ...(exact?.s12.some((value) => value !== 0) && {
      matrix: { s11: exact.s11, s12: exact.s12, s33: exact.s33, s34: exact.s34 },
      polarisation: exact.s12.map((value, j) => -value / exact.s11[j])
    })
  }
}

/** The matrix of grains at one wavelength, also where a run is content with a simpler law. */
function mieMatrix({ populations }: GrainsOpacitySpec, wavelength: number): ScatteringMatrix {
  const angles = scatteringAngles((2 * Math.PI * largestRadius(populations)) / wavelength)
  return { angles, ...mixtureOptics(populations, [wavelength], angles).matrix }
}
