import { sphericalOf } from '../src/grid/cells.js'
import { buildModel } from '../src/model/build-model.js'
import type { Model } from '../src/model/model.js'
import { observedWavelengths } from '../src/model/wavelengths.js'
import { parseScene } from '../src/scene/read.js'
import { type DustLight, dustLight } from '../src/solve/dust-light.js'
import { givenTemperatures } from '../src/solve/dust-temperatures.js'
import { scatterMedium } from '../src/solve/scatter-medium.js'
import { centralRadius2, type ScatterMedium } from '../src/transport/scatter-medium.js'
import { writeDoubles } from './doubles.js'

/** The dust of a scene at its first wavelength, as the program lays it out. */
export interface LitDust {
  model: Model
  light: DustLight
  medium: ScatterMedium
}

export function lightDust(text: string): LitDust {
  const model = buildModel(parseScene(text, 'bench.yaml'))
  const light = dustLight(model, givenTemperatures(model), observedWavelengths(model.scene)[0])
  return { model, light, medium: scatterMedium(model, light) }
}

/** Writes it as doubles for the yardsticks, in the order of native/medium.h: one scattering law, one sector in azimuth. */
export function writeMedium(path: string, { model, light, medium }: LitDust): void {
  const { cells, extinction, asymmetry, scattering, launch } = medium
  const walls = sphericalOf(medium.walls)
  if (asymmetry.length > 1 || walls.phi.length > 2) throw new Error('the yardsticks know one scattering law and no azimuth')
  const star = launch.find((source) => source.kind === 'point-star')
  const emitted = light.emission.map((value, cell) => 4 * Math.PI * value * model.volume[cell])
  const sizes = [walls.r.length - 1, walls.cosTheta.length - 1, asymmetry.length, cells]
  const source = [star?.luminosity ?? 0, star?.removed ?? 0, centralRadius2(medium)]
  writeDoubles(path, [sizes, source, walls.r, walls.cosTheta, extinction, asymmetry, scattering, emitted, light.opticalDepth])
}
