import { pixelSolidAngles } from '../camera/frame.js'
import { sigmaOfSum } from '../camera/noise-modes.js'
import type { CameraImages } from '../camera/types.js'
import type { Model } from '../model/model.js'
import { pixelContext } from '../output/pixel-context.js'
import { spectrumInUnit } from '../output/spectrum-in-unit.js'
import type { DustTemperatures } from '../solve/dust-temperatures.js'
import { AU, JANSKY, SOLAR_MASS } from '../units/constants.js'
import { intensityUnit } from '../units/intensity.js'
import { cellRadii } from './dust-cells.js'
import type { RunResult } from './run-result.js'

/** What a run found, in the units of the scene. */
export interface Findings {
  dust: DustFinding[]
  /** One entry a camera and wavelength. */
  images: {
    camera: string
    wavelengthUm: number
    unit: string
    peak: number
    peakSigma: number
    /** Of the whole field. */
    fluxJy: number
    fluxSigmaJy: number
  }[]
  /** One entry a spectrum and wavelength. */
  spectra: { spectrum: string; wavelengthUm: number; unit: string; flux: number; sigma: number }[]
}

export interface DustFinding {
  name: string
  massMsun: number
  /** What of the mass that the scene gives has sublimated; absent where none may. */
  sublimatedMsun?: number
  /** Where the inner radius was found from a temperature, or dust has sublimated within it. */
  innerRadius?: { au: number; sigmaAu: number; kelvin: number }
  /** Absent for dust that does not emit. */
  temperatures?: { hottest: CellTemperature; innerEdge: CellTemperature; coldest: CellTemperature }
}

export interface CellTemperature {
  kelvin: number
  sigmaKelvin: number
  radiusAu: number
}

/** Sums up a result. */
export function findings({ model, dust, innerRadii, images, spectra }: RunResult): Findings {
  return {
    dust: model.components.map(({ spec: { name, sublimation }, mass, massBefore }, c) => {
      const temperatures = temperaturesOf(model, dust, c)
      const found = innerRadii?.found.find(({ component }) => component === c)
      return {
        name,
        massMsun: mass / SOLAR_MASS,
        ...(sublimation !== undefined && { sublimatedMsun: Math.max(0, massBefore - mass) / SOLAR_MASS }),
        ...(found && {
          innerRadius: { au: found.radius / AU, sigmaAu: (found.radius * found.sigma) / AU, kelvin: found.temperature }
        }),
        ...(temperatures && { temperatures })
      }
    }),
    images: images.flatMap((result) => result.camera.wavelengths.map((wavelength, k) => imageFinding(result, wavelength, k))),
    spectra: spectra.flatMap((result) => {
      const { wavelengthUm, total, sigma } = spectrumInUnit(result)
      const { name, unit } = result.spectrum
      return wavelengthUm.map((um, k) => ({ spectrum: name, wavelengthUm: um, unit, flux: total[k], sigma: sigma[k] }))
    })
  }
}

/** A wavelength in cm as the number of micrometres that a person would write. */
export function micrometres(wavelength: number): number {
  return Number((wavelength * 1e4).toPrecision(15))
}

/** Cells whose temperature is known worse than this are left out. */
const KNOWN = 0.1

/** Extremes over the cells whose temperature is known; undefined for dust that does not emit. */
function temperaturesOf(model: Model, { temperature, sigma }: DustTemperatures, c: number): DustFinding['temperatures'] {
  const { components, cells } = model
  const { density } = components[c]
  const r = cellRadii(model)
  const at = (cell: number) => c * cells + cell
  const known = Array.from(density.keys()).filter((cell) => density[cell] > 0 && sigma[at(cell)] < KNOWN * temperature[at(cell)])
  if (known.length === 0) return undefined
  const nearest = known.reduce((least, cell) => Math.min(least, r[cell]), Number.POSITIVE_INFINITY)
  const best = (from: number[], score: (cell: number) => number) => {
    const cell = from.reduce((a, b) => (score(b) > score(a) ? b : a))
    return { kelvin: temperature[at(cell)], sigmaKelvin: sigma[at(cell)], radiusAu: r[cell] / AU }
  }
  return {
    hottest: best(known, (cell) => temperature[at(cell)]),
    innerEdge: best(
      known.filter((cell) => r[cell] === nearest),
      (cell) => density[cell]
    ),
    coldest: best(known, (cell) => -temperature[at(cell)])
  }
}

/** The brightest pixel in the camera's unit, and the flux of the whole field, each with its 1 sigma. */
function imageFinding(result: CameraImages, wavelength: number, k: number): Findings['images'][number] {
  const { camera, width, height, total, sigma } = result
  const pixels = width * height
  const solidAngles = pixelSolidAngles(camera)
  let brightest = k * pixels
  let sum = 0
  for (let i = k * pixels; i < (k + 1) * pixels; i++) {
    sum += total[i] * solidAngles[i - k * pixels]
    if (total[i] > total[brightest]) brightest = i
  }
  const unit = intensityUnit(camera.unit)
  const context = pixelContext(result, k)
  return {
    camera: camera.name,
    wavelengthUm: micrometres(wavelength),
    unit: camera.unit,
    peak: unit.fromCgs(total[brightest], context),
    peakSigma: unit.sigmaFromCgs(total[brightest], sigma[brightest], context),
    fluxJy: sum / JANSKY,
    fluxSigmaJy: sigmaOfSum(result, k, solidAngles) / JANSKY
  }
}
