import { SQUARE_ARCSECOND } from './angles.js'
import { BOLTZMANN, JANSKY, LIGHT_SPEED } from './constants.js'
import { linearUnit, magnitudeUnit, type SpectralUnit } from './spectral-unit.js'

/** What the size of an intensity unit depends on. */
export interface IntensityContext {
  frequencyHz: number
  /** Solid angle of a pixel, sr. */
  pixelSr: number
  /** Solid angle of the beam, sr; only `Jy/beam` needs it. */
  beamSr?: number
}

const units: SpectralUnit<IntensityContext>[] = [
  linearUnit('erg/s/cm2/Hz/sr', 'erg s-1 cm-2 Hz-1 sr-1', () => 1),
  linearUnit('W/m2/Hz/sr', 'W m-2 Hz-1 sr-1', () => 1e3),
  linearUnit('MJy/sr', 'MJy/sr', () => 1e6 * JANSKY),
  linearUnit('Jy/sr', 'Jy/sr', () => JANSKY),
  ...janskyPer('arcsec2', 'arcsec2', () => SQUARE_ARCSECOND),
  ...janskyPer('beam', 'beam', ({ beamSr }) => known(beamSr)),
  ...janskyPer('pixel', 'pix', ({ pixelSr }) => pixelSr),
  // Rayleigh-Jeans brightness temperature: I = 2 k T nu^2 / c^2.
  linearUnit('K', 'K', ({ frequencyHz }) => 2 * BOLTZMANN * (frequencyHz / LIGHT_SPEED) ** 2),
  magnitudeUnit('mag/arcsec2', 'mag/arcsec2', SQUARE_ARCSECOND)
]

/** Jy, mJy and uJy in a solid angle (sr); `fits` is its name in FITS units. */
function janskyPer(
  name: string,
  fits: string,
  solidAngle: (context: IntensityContext) => number
): SpectralUnit<IntensityContext>[] {
  return Object.entries({ Jy: JANSKY, mJy: 1e-3 * JANSKY, uJy: 1e-6 * JANSKY }).map(([unit, size]) =>
    linearUnit(`${unit}/${name}`, `${unit}/${fits}`, (context) => size / solidAngle(context))
  )
}

function known(beamSr: number | undefined): number {
  if (beamSr === undefined) throw new RangeError('Jy/beam needs the solid angle of a beam')
  return beamSr
}

/** Names of all intensity units. */
export const intensityUnits: string[] = units.map((unit) => unit.name)

/** The intensity unit of that name; throws a RangeError for a name not in `intensityUnits`. */
export function intensityUnit(name: string): SpectralUnit<IntensityContext> {
  const unit = units.find((candidate) => candidate.name === name)
  if (!unit) throw new RangeError(`no intensity unit ${name}`)
  return unit
}
