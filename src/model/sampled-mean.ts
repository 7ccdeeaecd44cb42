import type { Shape } from '../shapes/shape.js'

/** Points along each side of a cell; where the density varies by more than the contrast allowed, more. */
const COARSE = 3
const FINE = 5
const CONTRAST = 0.8
/** Cells with less than this share of the mass need no more points. */
const LITTLE = 1e-6

/** A cell between two radii (cm), two cosines of the polar angle and two azimuths. */
export interface SphericalCell {
  r: [number, number]
  cosTheta: [number, number]
  phi: [number, number]
}

/** Mean relative density of any shape in a cell, from the middles of equal parts of its volume. */
export function sampledMean({ relativeDensity, totalMass }: Shape, cell: SphericalCell): number {
  let [sum, least, most] = [0, Number.POSITIVE_INFINITY, 0]
  const sample = (points: number) => {
    sum = 0
    const { r, cosTheta, phi } = cell
    const [a3, b3] = [r[0] ** 3, r[1] ** 3]
    for (let i = 0; i < points; i++) {
      const radius = Math.cbrt(a3 + ((i + 0.5) / points) * (b3 - a3))
      for (let j = 0; j < points; j++) {
        const mu = cosTheta[0] + ((j + 0.5) / points) * (cosTheta[1] - cosTheta[0])
        const rho = radius * Math.sqrt((1 - mu) * (1 + mu))
        for (let k = 0; k < points; k++) {
          const azimuth = phi[0] + ((k + 0.5) / points) * (phi[1] - phi[0])
          const density = relativeDensity(rho * Math.cos(azimuth), rho * Math.sin(azimuth), radius * mu)
          sum += density
          least = Math.min(least, density)
          most = Math.max(most, density)
        }
      }
    }
    return sum / points ** 3
  }
  const coarse = sample(COARSE)
  const { r, cosTheta, phi } = cell
  const volume = ((r[1] ** 3 - r[0] ** 3) / 3) * (cosTheta[1] - cosTheta[0]) * (phi[1] - phi[0])
  return most - least <= CONTRAST * coarse || (coarse > 0 && coarse * volume < LITTLE * totalMass) ? coarse : sample(FINE)
}
