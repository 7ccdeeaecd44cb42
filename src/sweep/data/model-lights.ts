import { type ModelLight, spectrumSource } from '../../observe/run-source.js'
import { isFromPlace } from '../../scene/is-from-place.js'
import type { Scene } from '../../scene/types.js'
import { fluxUnit } from '../../units/flux.js'
import type { ModelResult } from '../folder/model-result.js'

/** The spectra of a model from its row of the table, which holds no images. */
export function lightOfResult({ spectra }: ModelResult): ModelLight {
  return {
    cameras: [],
    spectra: spectra.map(({ name }) => name),
    camera: (name) => {
      throw new Error(`the row of a model does not hold the images of ${name}`)
    },
    spectrum: (name) => {
      const found = spectra.find((one) => one.name === name)!
      return spectrumSource(name, fluxUnit(found.unit), found)
    }
  }
}

/** What a model of a scene will have, all dark: whether data can be compared with it is known before it is made. */
export function darkLight({ cameras, spectra, distance, sky }: Scene): ModelLight {
  return {
    cameras: cameras.map(({ name }) => name),
    spectra: spectra.map(({ name }) => name),
    camera: (name) => {
      const { view, field, pixels, wavelengths } = cameras.find((one) => one.name === name)!
      if (isFromPlace(view)) return undefined
      const [width, height] = pixels
      const dark = new Float64Array(width * height * wavelengths.length)
      return {
        name,
        width,
        height,
        pixel: [field[0] / width, field[1] / height],
        wavelengths,
        total: dark,
        sigma: dark,
        direct: dark,
        stars: [],
        blanks: 0,
        distance,
        ...(sky && { sky })
      }
    },
    spectrum: (name) => {
      const { wavelengths } = spectra.find((one) => one.name === name)!
      const dark = new Float64Array(wavelengths.length)
      return { name, wavelengths, total: dark, sigma: dark }
    }
  }
}
