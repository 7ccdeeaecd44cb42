import { interpolateLogLog } from '../../math/interp.js'

/** Numbers of grains by radius. */
export interface SizeDistribution {
  /** Radii (cm) between which there are grains. */
  smallest: number
  largest: number
  /** Grains per unit of radius (cm), in any unit. */
  density: (radius: number) => number
}

/** density ~ radius^slope between two radii, cm; -3.5 is the slope of Mathis, Rumpl & Nordsieck (1977, ApJ 217, 425). */
export function powerSizes(smallest: number, largest: number, slope = -3.5): SizeDistribution {
  return { smallest, largest, density: (radius) => (radius / smallest) ** slope }
}

/**
 * ln(radius) normally distributed about ln(median) with standard deviation `width`, cut at two radii; lengths in cm. density is
 * the number per unit of radius, exp(-ln(radius / median)^2 / (2 width^2)) / radius.
 */
export function lognormalSizes(smallest: number, largest: number, median: number, width: number): SizeDistribution {
  return {
    smallest,
    largest,
    density: (radius) => (Math.exp(-0.5 * (Math.log(radius / median) / width) ** 2) * median) / radius
  }
}

/** Power laws between tabulated points: radii (cm, increasing) and numbers per unit of radius (>= 0). */
export function tabulatedSizes(radii: ArrayLike<number>, numbers: ArrayLike<number>): SizeDistribution {
  return {
    smallest: radii[0],
    largest: radii[radii.length - 1],
    density: (radius) => interpolateLogLog(radii, numbers, radius)
  }
}
