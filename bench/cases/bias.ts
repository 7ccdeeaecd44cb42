import { join } from 'node:path'
import { median, standardError } from '../../src/math/stats.js'
import { AU } from '../../src/units/constants.js'
import type { BenchCase, Measure, Tools } from '../case.js'
import { runCommand } from '../command.js'
import { lightDust, writeMedium } from '../lit-dust.js'
import { brightPixels, ourPicture, peeledGroups } from '../merit.js'
import { DISK_FIELD, diskScene, SHELL_FIELD, shellScene } from '../scenes.js'

const PIXELS = 32

interface Trial {
  name: string
  about: string
  scene: string
  halfAu: number
  inclination: number
  peelPackets: number
  /** Pixels that symmetry makes equal to the one in column i and row j. */
  alike: (i: number, j: number) => [number, number][]
  /** The picture depends on the distance from its middle alone. */
  round: boolean
  /** Most median deviation of a pixel. */
  atMost: number
}

/** Pictures of scattered and emitted light with little noise against long peel-off, which knows no cells in its light. */
async function compareMeans(trial: Trial, { native, folder }: Tools): Promise<Measure[]> {
  const { scene, halfAu, inclination, peelPackets, alike, round, atMost } = trial
  const medium = join(folder, 'medium.bin')
  const images = join(folder, 'peeled.bin')
  writeMedium(medium, lightDust(scene))
  native!('peel', medium, images, inclination, halfAu * AU, PIXELS, peelPackets, 1, 1)
  const peeled = peeledGroups(images).map((group) => folded(group, alike))
  const { light } = ourPicture(join((await runCommand({ text: scene }, join(folder, 'ours'))).out, 'images', 'c0.fits'))
  const ours = folded(light, alike)
  const sum = (values: Float64Array) => values.reduce((total, value) => total + value, 0)
  // Intensity against light in a pixel: of pixels alike in size the ratio of the fluxes is that of the pictures.
  const unit = pixelUnit(halfAu)
  const fluxes = peeled.map((group) => sum(group) / unit)
  const flux = fluxes.reduce((total, value) => total + value, 0) / fluxes.length
  const bright = brightPixels(ours)
  const deviationsOf = (parts: number[][]) =>
    parts.map((pixels) => {
      const lights = peeled.map((group) => pixels.reduce((total, pixel) => total + group[pixel], 0) / unit)
      const mean = lights.reduce((total, value) => total + value, 0) / lights.length
      const light = pixels.reduce((total, pixel) => total + ours[pixel], 0)
      return { deviation: light / mean - 1, sigma: standardError(lights) / mean }
    })
  const deviations = deviationsOf(bright.map((pixel) => [pixel]))
  const ofRings = round ? deviationsOf(ringsOf(bright)) : []
  return [
    { quantity: 'flux over that of peel-off, less 1', unit: '', values: [sum(ours) / flux - 1] },
    { quantity: 'its 1 sigma', unit: '', values: [standardError(fluxes) / flux] },
    { quantity: 'deviation of the flux', unit: '', values: [Math.abs(sum(ours) / flux - 1)], target: { atMost: 0.003 } },
    {
      quantity: 'deviation of a pixel, median, noise of peel-off included',
      unit: '',
      values: [median(deviations.map(({ deviation }) => Math.abs(deviation)))],
      target: { atMost }
    },
    {
      // Half of all normal deviates are within 0.6745 sigma.
      quantity: 'what that noise alone would make',
      unit: '',
      values: [0.6745 * median(deviations.map(({ sigma }) => sigma))]
    },
    ...(round
      ? [
          {
            quantity: 'deviation of a ring of pixels, median, noise of peel-off included',
            unit: '',
            values: [median(ofRings.map(({ deviation }) => Math.abs(deviation)))],
            target: { atMost }
          },
          { quantity: 'what that noise alone would make', unit: '', values: [0.6745 * median(ofRings.map(({ sigma }) => sigma))] }
        ]
      : [])
  ]
}

/** Pixels at about the same distance from the middle, to half a pixel: what cells do to them is alike. */
function ringsOf(pixels: number[]): number[][] {
  const middle = 0.5 * (PIXELS - 1)
  const rings = new Map<number, number[]>()
  for (const pixel of pixels) {
    const distance = Math.round(Math.hypot((pixel % PIXELS) - middle, Math.floor(pixel / PIXELS) - middle))
    rings.set(distance, [...(rings.get(distance) ?? []), pixel])
  }
  return [...rings.values()]
}

/** erg/s/Hz/sr in a pixel for an intensity of 1 erg/s/cm2/Hz/sr. */
function pixelUnit(halfAu: number): number {
  return ((2 * halfAu * AU) / PIXELS) ** 2
}

/** The mean of each pixel and those alike. */
function folded(values: Float64Array, alike: Trial['alike']): Float64Array {
  return values.map((_, at) => {
    const all = alike(at % PIXELS, Math.floor(at / PIXELS))
    return all.reduce((sum, [i, j]) => sum + values[j * PIXELS + i], 0) / all.length
  })
}

const other = (i: number) => PIXELS - 1 - i
const sides = (i: number, j: number): [number, number][] => [
  [i, j],
  [other(i), j]
]
const eightfold = (i: number, j: number): [number, number][] => [
  ...sides(i, j),
  ...sides(i, other(j)),
  ...sides(j, i),
  ...sides(j, other(i))
]

const shells: Trial[] = [
  { depth: 0.1, peelPackets: 3e6, packets: 3e5, atMost: 0.01 },
  { depth: 1, peelPackets: 4e6, packets: 1e6, atMost: 0.01 },
  { depth: 10, peelPackets: 8e6, packets: 2e6, atMost: 0.01 },
  { depth: 100, peelPackets: 4e6, packets: 2e6, atMost: 0.02, glow: 300 }
].map(({ depth, peelPackets, packets, atMost, glow }) => ({
  name: `bias-shell-${depth}`,
  about: `picture of a shell of optical depth ${depth}${glow ? `, dust at ${glow} K without a star` : ', scattered light'} against long peel-off`,
  scene: shellScene({ depth, packets, glow, pixels: PIXELS }),
  halfAu: SHELL_FIELD.halfAu,
  inclination: 0,
  peelPackets,
  alike: eightfold,
  round: true,
  atMost
}))

const disk: Trial = {
  name: 'bias-disk-100',
  about: 'picture in scattered light of a disk of midplane optical depth 100 at 60 deg against long peel-off',
  scene: diskScene({ depth: 100, packets: 1e6, pixels: PIXELS }),
  halfAu: DISK_FIELD.halfAu,
  inclination: 60,
  peelPackets: 4e6,
  alike: sides,
  round: false,
  atMost: 0.02
}

/** What cells do to the mean of pictures. */
export const bias: BenchCase[] = [...shells, disk].map((trial) => ({
  name: trial.name,
  about: trial.about,
  native: true,
  run: (tools) => compareMeans(trial, tools)
}))
