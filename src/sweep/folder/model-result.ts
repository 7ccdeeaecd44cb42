import type { RunRecord } from '../../run/run-record.js'
import type { Seen } from '../data/see-model.js'

/** What the table tells of a finished model; the same bits however and wherever it was made, but for `cpuSeconds`. */
export interface ModelResult {
  model: number
  /** Whether the precision asked for was reached. */
  precise: boolean
  spectra: { name: string; unit: string; wavelengthUm: number[]; flux: number[]; sigma: number[] }[]
  images: { name: string; unit: string; wavelengthUm: number[]; fluxJy: number[]; peak: number[]; peakSigma: number[] }[]
  /** Photon packets, of all kinds and wavelengths. */
  packets: number
  warnings: string[]
  cpuSeconds: number
  /** Present where more is asked of a model than its fluxes tell. */
  seen?: Seen
}

/** The part of a run's record that is kept of a model. */
export function modelResult(model: number, record: RunRecord, seen?: Seen): ModelResult {
  const { found, packets, times, warnings, state } = record
  return {
    model,
    precise: state === 'done',
    spectra: byName(found.spectra, ({ spectrum }) => spectrum).map(([name, points]) => ({
      name,
      unit: points[0].unit,
      wavelengthUm: points.map(({ wavelengthUm }) => wavelengthUm),
      flux: points.map(({ flux }) => orNaN(flux)),
      sigma: points.map(({ sigma }) => orNaN(sigma))
    })),
    images: byName(found.images, ({ camera }) => camera).map(([name, points]) => ({
      name,
      unit: points[0].unit,
      wavelengthUm: points.map(({ wavelengthUm }) => wavelengthUm),
      fluxJy: points.map(({ fluxJy }) => orNaN(fluxJy)),
      peak: points.map(({ peak }) => orNaN(peak)),
      peakSigma: points.map(({ peakSigma }) => orNaN(peakSigma))
    })),
    packets: packets.equilibrium + packets.light.reduce((sum, at) => sum + at.packets, 0),
    warnings,
    cpuSeconds: Object.values(times).reduce((sum, { cpuSeconds }) => sum + cpuSeconds, 0),
    ...(seen && { seen })
  }
}

function byName<Point>(points: Point[], nameOf: (point: Point) => string): [string, Point[]][] {
  const groups = new Map<string, Point[]>()
  for (const point of points) groups.set(nameOf(point), [...(groups.get(nameOf(point)) ?? []), point])
  return [...groups]
}

/** JSON has null where a number was none. */
export function orNaN(value: number | null | undefined): number {
  return value ?? Number.NaN
}
