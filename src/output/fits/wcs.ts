import type { Scene } from '../../scene/types.js'
import { DEGREE } from '../../units/angles.js'
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
 * World coordinates of an image cube: celestial axes, and a third of vacuum wavelengths looked up in a table
 * (Greisen et al. 2006, A&A 446, 747, section 6), which `wavelengthTableHdu` writes.
 */
export function wcsCards(view: FieldOfView, sky: Scene['sky']): string[] {
  return [
    card('WCSAXES', 3),
    ...celestialCards(view, sky),
    card('CTYPE3', 'WAVE-TAB', 'vacuum wavelength, by table'),
    card('CUNIT3', 'm'),
    realCard('CRPIX3', 1),
    realCard('CRVAL3', 1, 'row of the wavelength table'),
    realCard('CDELT3', 1),
    card('PS3_0', wavelengthTable, 'extension with the wavelengths'),
    card('PS3_1', wavelengthTable, 'its column')
  ]
}

/** World coordinates of a single image. */
export function imageWcsCards(view: FieldOfView, sky: Scene['sky']): string[] {
  return [card('WCSAXES', 2), ...celestialCards(view, sky)]
}

/** Gnomonic projection about the image centre, north up and east to the left (Calabretta & Greisen 2002, A&A 395, 1077). */
function celestialCards({ width, height, field: [across, up] }: FieldOfView, sky: Scene['sky']): string[] {
  return [
    card('CTYPE1', 'RA---TAN', 'right ascension, gnomonic'),
    card('CTYPE2', 'DEC--TAN', 'declination, gnomonic'),
    card('CUNIT1', 'deg'),
    card('CUNIT2', 'deg'),
    realCard('CRPIX1', (width + 1) / 2, 'centre of the image'),
    realCard('CRPIX2', (height + 1) / 2, 'centre of the image'),
    realCard('CRVAL1', sky?.raDeg ?? 0),
    realCard('CRVAL2', sky?.decDeg ?? 0),
    realCard('CDELT1', -across / width / DEGREE, 'east is to the left'),
    realCard('CDELT2', up / height / DEGREE, 'north is up'),
    card('RADESYS', 'ICRS'),
    ...(sky ? [] : [commentCard('The scene gives no sky position: CRVAL1 and CRVAL2 are placeholders.')])
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
