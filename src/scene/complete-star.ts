import { STEFAN_BOLTZMANN } from '../units/constants.js'

/** Numbers of a star, cgs; absent ones follow from the others or are not needed. */
export interface StarNumbers {
  temperature?: number
  luminosity?: number
  radius?: number
}

interface WrittenStar extends StarNumbers {
  extent: 'point' | 'sphere'
  spectrum?: object
}

/**
 * Luminosity (erg/s), temperature (K) and radius (cm) of a star from those written, by L = 4 pi R^2 sigma T^4.
 * A blackbody gives exactly two of the three; a star with a table its luminosity, and where it has a surface one more.
 */
export function completeStar(written: WrittenStar): (StarNumbers & { luminosity: number }) | { problem: string } {
  const { temperature, luminosity, radius, extent } = written
  const given = Object.entries({ temperature, luminosity, radius }).filter(([, value]) => value !== undefined)
  const names = given.length === 0 ? 'none' : given.map(([key]) => key).join(', ')
  if (written.spectrum) {
    if (luminosity === undefined) return { problem: 'a star with a table needs its `luminosity`' }
    if (given.length === 3) return { problem: 'a star with a table gives at most one of `radius` and `temperature`' }
    if (extent === 'sphere' && given.length === 1)
      return { problem: '`extent: sphere` needs `radius`, or `temperature` to derive it from' }
    return { temperature, luminosity, radius: radius ?? (temperature && radiusOf(luminosity, temperature)) }
  }
  if (given.length !== 2)
    return { problem: `a blackbody star gives exactly two of \`temperature\`, \`luminosity\`, \`radius\`; given: ${names}` }
  if (luminosity === undefined) return { temperature, luminosity: luminosityOf(radius!, temperature!), radius }
  return {
    temperature: temperature ?? (luminosity / luminosityOf(radius!, 1)) ** 0.25,
    luminosity,
    radius: radius ?? radiusOf(luminosity, temperature!)
  }
}

function luminosityOf(radius: number, temperature: number): number {
  return 4 * Math.PI * radius ** 2 * STEFAN_BOLTZMANN * temperature ** 4
}

function radiusOf(luminosity: number, temperature: number): number {
  return Math.sqrt(luminosity / (4 * Math.PI * STEFAN_BOLTZMANN * temperature ** 4))
}
