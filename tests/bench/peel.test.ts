import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { beforeAll, describe, expect, it } from 'vitest'
import { readDoubles } from '../../bench/doubles.js'
import { lightDust, writeMedium } from '../../bench/lit-dust.js'
import { compileNative } from '../../bench/native.js'
import { DISK_FIELD, diskScene, PIXELS, SHELL_FIELD, shellScene } from '../../bench/scenes.js'
import { mean, standardError } from '../../src/math/stats.js'
import { runScene } from '../../src/run/run-scene.js'
import { parseScene } from '../../src/scene/read.js'
import { AU } from '../../src/units/constants.js'
import { sumOf } from '../physics/pictures.js'
import { folderWith } from '../support/folder-with.js'

const folder = folderWith()
const native = compileNative(fileURLToPath(new URL('../../bench/native', import.meta.url)), folder)

const cases = [
  {
    name: 'shell of optical depth 1',
    text: shellScene({ depth: 1, packets: 20_000, pixels: 8 }),
    half: SHELL_FIELD.halfAu,
    inclination: 0,
    packets: 100_000
  },
  {
    name: 'glowing shell of optical depth 3',
    text: shellScene({ depth: 3, glow: 300, packets: 20_000, pixels: 8 }),
    half: SHELL_FIELD.halfAu,
    inclination: 0,
    packets: 100_000
  },
  {
    name: 'disk of optical depth 100 at 60 deg',
    text: diskScene({ depth: 100, packets: 5000, pixels: 8, grid: [41, 30, 1] }),
    half: DISK_FIELD.halfAu,
    inclination: 60,
    packets: 300_000
  }
]

/**
 * Peel-off in C shares no code with the program, only its cells. Its error comes from 16 groups: beyond 4.5 of Student's t with 15
 * degrees of freedom lies 1 of 2000 by chance. A bias of the emissivity method of 0.5 % of the flux is allowed beside.
 */
describe.skipIf(!native).each(cases)('peel-off in C: $name', ({ text, half, inclination, packets }) => {
  let expected: number
  beforeAll(async () => {
    const scene = parseScene(text, 'bench.yaml')
    const { images } = await runScene(scene, { workers: 1, estimator: 'emissivity', onProgress: () => {} })
    const [{ emitted, scattered, camera, width, height }] = images
    const pixel = (camera.field[0] * camera.field[1] * scene.distance ** 2) / (width * height)
    expected = (sumOf(emitted) + sumOf(scattered)) * pixel
  })

  it.each([0, 1])('has the flux of the program, forced %i', (forced) => {
    const medium = join(folder, 'medium.bin')
    const images = join(folder, 'images.bin')
    writeMedium(medium, lightDust(text))
    native!('peel', medium, images, inclination, half * AU, PIXELS, packets, forced, 1)
    const values = readDoubles(images)
    const pixels = PIXELS * PIXELS
    const fluxes = Array.from({ length: values.length / pixels }, (_, group) =>
      sumOf(values.subarray(group * pixels, (group + 1) * pixels))
    )
    const sigma = standardError(fluxes)
    expect(sigma / expected).toBeLessThan(0.015)
    expect(Math.abs(mean(fluxes) - expected)).toBeLessThan(4.5 * sigma + 0.005 * expected)
  })
})
