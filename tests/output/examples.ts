import { type StokesPlanes, stokesPlanes } from '../../src/camera/stokes-planes.js'
import type { ApertureSpectrum, CameraImages } from '../../src/camera/types.js'
import type { Scene } from '../../src/scene/types.js'

const arcsecond = Math.PI / 648000
const parsec = (648000 / Math.PI) * 1.495978707e13

/** A scene with nothing in it but what files quote. */
export function exampleScene(change: Partial<Scene> = {}): Scene {
  return {
    file: 'example.yaml',
    title: 'Example source',
    distance: 250 * parsec,
    sky: { raDeg: 84.21, decDeg: -31.7 },
    seed: '',
    sources: [],
    opacities: {},
    dust: [],
    grid: { kind: 'auto', radial: 0, polar: 0, azimuthal: 0, width: 0, finest: 12, cellsAtMost: 300_000 },
    effort: { precision: 0.01, equilibrium: 0, cameras: 0, equilibriumAsked: false },
    cameras: [],
    spectra: [],
    inputs: [],
    locate: () => ({ file: 'example.yaml', line: 1, column: 1 }),
    ...change
  }
}

interface ImageOptions {
  /** Q and U (cgs) of a pixel, V a hundredth of the intensity, errors a tenth of V. */
  polarised?: (x: number, y: number) => [q: number, u: number]
  pixels?: [number, number]
  fieldArcsec?: [number, number]
  unit?: string
  wavelengths?: number[]
}

/** Images whose total is `intensity(x, y, k)` (cgs), with 1 % errors that are alike in all pixels (one mode), half emitted and half scattered. */
export function exampleImages(intensity: (x: number, y: number, k: number) => number, options: ImageOptions = {}): CameraImages {
  const { pixels = [6, 4], fieldArcsec = [12, 8], unit = 'MJy/sr', wavelengths = [0.55e-4, 870e-4] } = options
  const [width, height] = pixels
  const total = new Float64Array(width * height * wavelengths.length)
  for (let k = 0; k < wavelengths.length; k++) {
    for (let y = 0; y < height; y++) {
      for (let x = 0; x < width; x++) total[(k * height + y) * width + x] = intensity(x, y, k)
    }
  }
  return {
    camera: {
      name: 'face',
      view: { inclination: (35 * Math.PI) / 180, azimuth: 0, roll: 0 },
      field: [fieldArcsec[0] * arcsecond, fieldArcsec[1] * arcsecond],
      pixels,
      wavelengths,
      unit
    },
    width,
    height,
    total,
    sigma: total.map((value) => value / 100),
    modes: Int8Array.from({ length: 16 * total.length }, (_, i) => (Math.floor(i / (width * height)) % 16 === 0 ? 127 : 0)),
    direct: new Float64Array(total.length),
    emitted: total.map((value) => value / 2),
    scattered: total.map((value) => value / 2),
    stars: [],
    samplingError: wavelengths.map(() => 0),
    beyond: wavelengths.map(() => 0),
    ...(options.polarised && { stokes: exampleStokes(total, width, height, options.polarised) })
  }
}

function exampleStokes(
  total: Float64Array,
  width: number,
  height: number,
  polarised: NonNullable<ImageOptions['polarised']>
): StokesPlanes {
  const planes = stokesPlanes(total.length)
  for (let i = 0; i < total.length; i++) {
    const [q, u] = polarised(i % width, Math.floor(i / width) % height)
    planes.q[i] = q
    planes.u[i] = u
    planes.v[i] = total[i] / 100
    for (const sigma of ['sigmaQ', 'sigmaU', 'sigmaV'] as const) planes[sigma][i] = total[i] / 1000
  }
  return planes
}

/** A spectrum with the totals given (cgs), 10 % errors, half direct and half emitted. */
export function exampleSpectrum(wavelengths: number[], flux: number[], unit = 'Jy'): ApertureSpectrum {
  const total = Float64Array.from(flux)
  return {
    spectrum: { name: 'sed', view: { inclination: 0, azimuth: 0, roll: 0 }, aperture: 6 * arcsecond, wavelengths, unit },
    total,
    sigma: total.map((value) => value / 10),
    direct: total.map((value) => value / 2),
    emitted: total.map((value) => value / 2),
    scattered: new Float64Array(total.length),
    samplingError: flux.map(() => 0)
  }
}
