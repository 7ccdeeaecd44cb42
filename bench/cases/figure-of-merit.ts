import { join } from 'node:path'
import { AU } from '../../src/units/constants.js'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'
import { type CommandRun, runCommand } from '../command.js'
import { lightDust, writeMedium } from '../lit-dust.js'
import { ourPicture, type Picture, peeledPicture, relativeVariance } from '../merit.js'
import { DISK_FIELD, diskScene, PIXELS, SHELL_FIELD, shellScene } from '../scenes.js'

/** Of contests with a target; others are played once. */
const REPETITIONS = 2

interface Contest {
  name: string
  about: string
  scene: (packets: number) => string
  halfAu: number
  inclination: number
  /**
   * Packets of ours: the whole command takes five to ten seconds. The longer it is, the less its start, rays and products weigh, and
   * the better it looks. Packets of the yardstick: a few seconds, and its loop alone is timed.
   */
  packets: number
  peelPackets: number
  atLeast?: number
}

/** Relative variance times time of a picture: the less, the better. Of two ways to the yardstick the better one counts. */
async function compete({ scene, halfAu, inclination, packets, peelPackets, atLeast }: Contest, { native, folder }: Tools) {
  const text = scene(packets)
  const medium = join(folder, 'medium.bin')
  const images = join(folder, 'peeled.bin')
  writeMedium(medium, lightDust(text))
  const peel = (forced: 0 | 1) => (repetition: number) => {
    const times = native!('peel', medium, images, inclination, halfAu * AU, PIXELS, peelPackets, forced, repetition + 1)
    return { ...times, picture: peeledPicture(images) }
  }
  const ours = async (repetition: number) => {
    const run = await runCommand({ text }, join(folder, 'ours'), { seed: repetition })
    return { ...run, picture: ourPicture(join(run.out, 'images', 'c0.fits')) }
  }
  const [mine, plain, forced] = await interleaved(atLeast ? REPETITIONS : 1, ours, peel(0), peel(1))
  const bright = mine[0].picture
  const cost = ({ cpuSeconds, picture }: { cpuSeconds: number; picture: Picture }) =>
    cpuSeconds * relativeVariance(picture, bright)
  const best = mine.map((_, i) => Math.min(cost(plain[i]), cost(forced[i])))
  return [
    { quantity: 'ours, processor time', unit: 's', values: mine.map(({ cpuSeconds }: CommandRun) => cpuSeconds) },
    {
      quantity: 'ours, relative sigma',
      unit: '',
      values: mine.map(({ picture }) => Math.sqrt(relativeVariance(picture, bright)))
    },
    { quantity: 'peel-off, processor time', unit: 's', values: plain.map(({ cpuSeconds }) => cpuSeconds) },
    {
      quantity: 'peel-off, relative sigma',
      unit: '',
      values: plain.map(({ picture }) => Math.sqrt(relativeVariance(picture, bright)))
    },
    { quantity: 'merit relative to plain peel-off', unit: '', values: mine.map((run, i) => cost(plain[i]) / cost(run)) },
    { quantity: 'merit relative to forced peel-off', unit: '', values: mine.map((run, i) => cost(forced[i]) / cost(run)) },
    {
      quantity: 'merit relative to the better one',
      unit: '',
      values: mine.map((run, i) => best[i] / cost(run)),
      ...(atLeast && { target: { atLeast } })
    }
  ] satisfies Measure[]
}

const shells: Contest[] = [
  { depth: 0.1, packets: 3e6, peelPackets: 1e6, atLeast: 1e5 },
  { depth: 1, packets: 3e6, peelPackets: 6e5, atLeast: 5000 },
  { depth: 10, packets: 2e6, peelPackets: 4e5, atLeast: 2000 },
  // No starlight gets through so much dust: its own glow is looked at.
  { depth: 100, packets: 2e6, peelPackets: 4e5, atLeast: 500, glow: 300 }
].map(({ depth, packets, peelPackets, atLeast, glow }) => ({
  name: `shell-${depth}`,
  about: `picture of a shell of optical depth ${depth}${glow ? `, dust at ${glow} K without a star` : ', scattered light'}: whole command against peel-off in C`,
  scene: (count: number) => shellScene({ depth, packets: count, glow }),
  halfAu: SHELL_FIELD.halfAu,
  inclination: 0,
  packets,
  peelPackets,
  atLeast
}))

const disks: Contest[] = [1e2, 1e4, 1e6].flatMap((depth) =>
  [30, 60, 85].map((inclination) => ({
    name: `disk-${depth.toExponential(0).replace('+', '')}-${inclination}`,
    about: `picture in scattered light of a disk of midplane optical depth ${depth.toExponential(0)} at ${inclination} deg: whole command against peel-off in C`,
    scene: (packets: number) => diskScene({ depth, inclinations: [inclination], packets }),
    halfAu: DISK_FIELD.halfAu,
    inclination,
    packets: 4e5,
    peelPackets: 2e5,
    ...(depth === 1e4 && inclination === 60 && { atLeast: 500 })
  }))
)

/** 1 / (relative variance x time) of pictures, against brute-force peel-off of the same scene. */
export const figureOfMerit: BenchCase[] = [...shells, ...disks].map((contest) => ({
  name: contest.name,
  about: contest.about,
  native: true,
  run: (tools) => compete(contest, tools)
}))
