import type { CameraImages } from '../../camera/types.js'
import { line } from '../draw/svg.js'
import { niceBelow } from '../draw/ticks.js'
import type { SkyPanel } from './sky-marks.js'
import { uprightStokes } from './upright-stokes.js'

/** Ticks along the longer side. */
const across = 22
/** Polarised intensity below this many times its error, or below this share of the brightest tick's, has no tick. */
const significant = 3
const faintest = 1e-4

interface Tick {
  /** Middle, as shares of the width from the left and of the height from the bottom. */
  x: number
  y: number
  /** Angle of the electric vector from up to the left, rad: from north through east, where north is up. */
  angle: number
  degree: number
  polarised: number
}

/**
 * Ticks on a panel along the electric vector, each the mean over a square of pixels, as long as the degree of polarisation; and words
 * that say how long.
 */
export function polarisationTicks(images: CameraImages, k: number): { marks: (panel: SkyPanel) => string[]; note: string } {
  const side = Math.max(1, Math.ceil(Math.max(images.width, images.height) / across))
  const ticks = means(images, k, side)
  const most = ticks.reduce((value, { degree }) => Math.max(value, degree), 0)
  // A tick of this degree is as long as the squares are wide.
  const full = 1.25 * most
  const example = niceBelow(full)
  const marks = ({ left, top, width, height }: SkyPanel) =>
    ticks.flatMap(({ x, y, angle, degree }) => {
      const half = (0.5 * side * (degree / full) * width) / images.width
      const [dx, dy] = [half * Math.sin(angle), half * Math.cos(angle)]
      const [cx, cy] = [left + x * width, top + (1 - y) * height]
      // East is to the left: north through east is counter-clockwise.
      const ends = [cx - dx, cy - dy, cx + dx, cy + dy].map((value) => Number(value.toFixed(2))) as [
        number,
        number,
        number,
        number
      ]
      return [line(...ends, '#000', 3), line(...ends, '#fff', 1.4)]
    })
  const length = Number(((100 * example * side) / full / images.width).toPrecision(2))
  const note =
    ticks.length > 0
      ? `ticks along the electric vector; ${percent(example)} polarised is ${length} % of the width`
      : 'no polarised light'
  return { marks, note }
}

function means(images: CameraImages, k: number, side: number): Tick[] {
  const { width, height, total, stokes } = images
  const ticks: Tick[] = []
  const { sigmaQ, sigmaU } = stokes!
  const { q, u } = uprightStokes(images, k)
  for (let y = 0; y < height; y += side) {
    for (let x = 0; x < width; x += side) {
      let [i, qs, us, variance] = [0, 0, 0, 0]
      const [right, upper] = [Math.min(width, x + side), Math.min(height, y + side)]
      for (let row = y; row < upper; row++) {
        for (let pixel = row * width + x; pixel < row * width + right; pixel++) {
          const at = k * width * height + pixel
          i += total[at]
          qs += q[pixel]
          us += u[pixel]
          variance += sigmaQ[at] ** 2 + sigmaU[at] ** 2
        }
      }
      const polarised = Math.hypot(qs, us)
      if (!(i > 0 && polarised > significant * Math.sqrt(variance))) continue
      const middle = { x: (x + right) / 2 / width, y: (y + upper) / 2 / height }
      ticks.push({ ...middle, angle: 0.5 * Math.atan2(us, qs), degree: polarised / i, polarised })
    }
  }
  const brightest = ticks.reduce((most, { polarised }) => Math.max(most, polarised), 0)
  return ticks.filter(({ polarised }) => polarised > faintest * brightest)
}

function percent(share: number): string {
  return `${Number((100 * share).toPrecision(3))} %`
}
