import { forwardOf } from '../../camera/place-view.js'
import type { PlaceViewSpec, Scene } from '../../scene/types.js'
import { DEGREE } from '../../units/angles.js'
import { inDegrees } from '../in-degrees.js'
import { card, commentCard, realCard } from './card.js'
import { type FitsColumn, tableHdu } from './table.js'

const wavelengthTable = 'WAVELENGTH'

/** Pixels across and up, and full width and height, rad. */
export interface FieldOfView {
  width: number
  height: number
  field: [number, number]
}

/**
 * World coordinates of an image cube: the cards of its celestial axes, and a third axis of vacuum wavelengths looked up in a table
 * (Greisen et al. 2006, A&A 446, 747, section 6), which `wavelengthTableHdu` writes.
 */
export function wcsCards(celestial: string[]): string[] {
  return [
    card('WCSAXES', 3),
    ...celestial,
    card('CTYPE3', 'WAVE-TAB', 'vacuum wavelength, by table'),
    card('CUNIT3', 'm'),
    realCard('CRPIX3', 1),
    realCard('CRVAL3', 1, 'row of the wavelength table'),
    realCard('CDELT3', 1),
    card('PS3_0', wavelengthTable, 'extension with the wavelengths'),
    card('PS3_1', wavelengthTable, 'its column')
  ]
}

/** Gnomonic projection about the image centre, north up and east to the left (Calabretta & Greisen 2002, A&A 395, 1077). */
export function celestialCards({ width, height, field: [across, up] }: FieldOfView, sky: Scene['sky']): string[] {
  return [
    card('CTYPE1', 'RA---TAN', 'right ascension, gnomonic'),
    card('CTYPE2', 'DEC--TAN', 'declination, gnomonic'),
    ...linearCards(width, height, [sky?.raDeg ?? 0, sky?.decDeg ?? 0], [across / width / DEGREE, up / height / DEGREE]),
    card('RADESYS', 'ICRS'),
    ...(sky ? [] : [commentCard('The scene gives no sky position: CRVAL1 and CRVAL2 are placeholders.')])
  ]
}

/**
 * The celestial axes of an image from a place of the scene: longitude and latitude in its frame, +z the north pole, in gnomonic projection
 * about the line of sight, or plate carree (CAR) of all directions (same paper).
 */
export function placeCards(view: PlaceViewSpec, { width, height, field }: FieldOfView): string[] {
  const { allSky, roll } = view
  const { longitude, latitude } = forwardOf(view)
  const [across, up] = field.map((angle) => (allSky ? angle : 2 * Math.tan(angle / 2)) / DEGREE)
  const [projection, words] = allSky ? ['CAR', 'plate carree'] : ['TAN', 'gnomonic']
  const [east, north] = [across / width, up / height]
  const turned = [
    realCard('PC1_1', Math.cos(roll), 'the picture is turned'),
    realCard('PC1_2', (Math.sin(roll) * north) / east),
    realCard('PC2_1', (-Math.sin(roll) * east) / north),
    realCard('PC2_2', Math.cos(roll))
  ]
  return [
    card('CTYPE1', `SCLN-${projection}`, `longitude in the scene, ${words}`),
    card('CTYPE2', `SCLT-${projection}`, `latitude in the scene, ${words}`),
    ...linearCards(width, height, [inDegrees(longitude), inDegrees(latitude)], [east, north]),
    ...(roll === 0 ? [] : turned),
    realCard('LONPOLE', allSky ? 0 : 180, '[deg] longitude of the pole in the projection'),
    commentCard('Longitude and latitude are those of the scene: +x is at (0, 0), +z is north.')
  ]
}

/** Where the middle of an image lies, and its pixels, deg. */
function linearCards(width: number, height: number, middle: [number, number], pixel: [number, number]): string[] {
  return [
    card('CUNIT1', 'deg'),
    card('CUNIT2', 'deg'),
    realCard('CRPIX1', (width + 1) / 2, 'centre of the image'),
    realCard('CRPIX2', (height + 1) / 2, 'centre of the image'),
    realCard('CRVAL1', middle[0]),
    realCard('CRVAL2', middle[1]),
    realCard('CDELT1', -pixel[0], 'east is to the left'),
    realCard('CDELT2', pixel[1], 'north is up')
  ]
}

/** The extension that the third axis refers to: one row holding all wavelengths (given in cm), in m. */
export function wavelengthTableHdu(wavelengths: number[]): Uint8Array {
  const column: FitsColumn = {
    name: wavelengthTable,
    unit: 'm',
    values: Float64Array.from(wavelengths, (wavelength) => wavelength / 100),
    repeat: wavelengths.length,
    dimensions: [1, wavelengths.length]
  }
  return tableHdu(wavelengthTable, [column])
}
