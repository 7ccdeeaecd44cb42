import { ARCMINUTE, ARCSECOND, DEGREE, MILLIARCSECOND } from './angles.js'

/** Sizes of the units of solid angle, sr (small angles: squares). */
export const solidAngleUnits: Record<string, number> = {
  sr: 1,
  deg2: DEGREE ** 2,
  arcmin2: ARCMINUTE ** 2,
  arcsec2: ARCSECOND ** 2,
  mas2: MILLIARCSECOND ** 2
}

/** Solid angle (sr) of a Gaussian beam of these full widths at half maximum (rad): pi/(4 ln 2) major minor; common practice. */
export function gaussianBeamSr(major: number, minor: number): number {
  return (Math.PI / (4 * Math.LN2)) * major * minor
}
