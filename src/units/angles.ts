/** Degree, rad. */
export const DEGREE = Math.PI / 180

/** Minute of arc, rad. */
export const ARCMINUTE = Math.PI / 10800

/** Second of arc, rad. */
export const ARCSECOND = Math.PI / 648000

/** Thousandth of a second of arc, rad. */
export const MILLIARCSECOND = Math.PI / 648e6

/** Solid angle of a square second of arc, sr (small-angle, as the unit arcsec2 is used). */
export const SQUARE_ARCSECOND = ARCSECOND * ARCSECOND
