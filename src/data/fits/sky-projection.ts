import { DataError } from '../error.js'
import { pixelMatrix } from './pixel-matrix.js'
import type { FitsUnit } from './read.js'

const DEGREE = Math.PI / 180

/** A direction on the sky as a unit vector, or part of one. */
export type Direction = [number, number, number]

/** Where directions on the sky lie in an image; pixels count from 0, the first has its centre at 0. */
export interface SkyProjection {
  /** ICRS, deg: the place that the projection is about. */
  raDeg: number
  decDeg: number
  pixelSr: number
  toPixel: (direction: Direction) => [x: number, y: number]
}

/** Directions about a place: towards it, east of it and north of it. */
export function frameAt(raDeg: number, decDeg: number): { centre: Direction; east: Direction; north: Direction } {
  const [ra, dec] = [raDeg * DEGREE, decDeg * DEGREE]
  const [sinA, cosA, sinD, cosD] = [Math.sin(ra), Math.cos(ra), Math.sin(dec), Math.cos(dec)]
  return { centre: [cosD * cosA, cosD * sinA, sinD], east: [-sinA, cosA, 0], north: [-sinD * cosA, -sinD * sinA, cosD] }
}

/** Distance from the centre of a projection, of a direction at the cosine and sine of an angle from it, over that sine. */
const zenithal: Record<string, (cosine: number, sine: number) => number> = {
  TAN: (cosine) => 1 / cosine,
  SIN: () => 1,
  ARC: (cosine, sine) => (sine > 1e-9 ? Math.atan2(sine, cosine) / sine : 1),
  STG: (cosine) => 2 / (1 + cosine)
}

const accepted = `CTYPE1 and CTYPE2 of RA and DEC in one of the projections ${Object.keys(zenithal).join(', ')}`

/**
 * The celestial coordinates of an image (Calabretta & Greisen 2002, A&A 395, 1077, section 5.1). Throws a DataError where there
 * are none, or others than are known here.
 */
export function skyProjection(unit: FitsUnit): SkyProjection {
  const { header, file, name } = unit
  const refuse = (reason: string): never => {
    throw new DataError(file, `${name}: ${reason}`)
  }
  const types = ['CTYPE1', 'CTYPE2'].map((keyword) => header.text(keyword))
  if (types.every((type) => type === undefined)) refuse(`has no celestial coordinates (no WCS); ${accepted} are expected`)
  const [, kind = ''] = /^RA---(...)$/.exec(types[0] ?? '') ?? []
  if (!zenithal[kind] || types[1] !== `DEC--${kind}`) refuse(`the axes are ${types.join(', ')}; ${accepted} are expected`)
  for (const keyword of ['CUNIT1', 'CUNIT2']) {
    const written = header.text(keyword)
    if (written !== undefined && !/^deg/.test(written)) refuse(`${keyword} is ${written}; deg is expected`)
  }
  if ((header.number('LONPOLE') ?? 180) !== 180) refuse('LONPOLE other than 180 is not known here')
  // FK5 of 2000 is taken as ICRS: they differ by some 20 mas (IAU resolution B2, 1997).
  const equinox = header.number('EQUINOX') ?? 2000
  const system = header.text('RADESYS') ?? 'ICRS'
  if (equinox !== 2000 || !['ICRS', 'FK5'].includes(system))
    refuse(`coordinates are ${system} of ${equinox}; ICRS or FK5 of 2000 are expected`)
  const matrix = pixelMatrix(unit) ?? refuse('has no scale (CDELTi or CDi_j)')
  const [crpix1, crpix2, raDeg, decDeg] = ['CRPIX1', 'CRPIX2', 'CRVAL1', 'CRVAL2'].map(
    (keyword) => header.number(keyword) ?? refuse(`has no ${keyword}`)
  )
  const { centre, east, north } = frameAt(raDeg, decDeg)
  const { perEast, perNorth, pixelSr } = matrix
  const stretch = zenithal[kind]
  return {
    raDeg,
    decDeg,
    pixelSr,
    toPixel: (direction) => {
      const [x, y] = [dot(direction, east), dot(direction, north)]
      const factor = stretch(dot(direction, centre), Math.hypot(x, y))
      return [crpix1 - 1 + factor * (perEast[0] * x + perNorth[0] * y), crpix2 - 1 + factor * (perEast[1] * x + perNorth[1] * y)]
    }
  }
}

const dot = (a: Direction, b: Direction) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
