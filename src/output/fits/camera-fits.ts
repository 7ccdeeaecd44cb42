import { MODE_STEPS } from '../../camera/noise-modes.js'
import { STOKES_PAIRS } from '../../camera/stokes-planes.js'
import type { CameraImages, StarOnSky } from '../../camera/types.js'
import { isFromPlace } from '../../scene/is-from-place.js'
import type { Scene, Vector } from '../../scene/types.js'
import { ARCSECOND, DEGREE } from '../../units/angles.js'
import { AU, JANSKY } from '../../units/constants.js'
import { type IntensityContext, intensityUnit } from '../../units/intensity.js'
import { inDegrees } from '../in-degrees.js'
import { pixelContext } from '../pixel-context.js'
import { stokesUnit } from '../stokes-unit.js'
import { card, commentCard, realCard } from './card.js'
import { joined } from './hdu.js'
import { imageHdu, stepsHdu } from './image.js'
import { originCards } from './origin-cards.js'
import { tableHdu } from './table.js'
import { celestialCards, placeCards, wavelengthTableHdu, wcsCards } from './wcs.js'

type Plane = 'total' | 'sigma' | 'direct' | 'emitted' | 'scattered' | 'deficit'

const planes: [Plane, string][] = [
  ['total', 'total specific intensity'],
  ['sigma', '1 sigma of the Monte Carlo part'],
  ['direct', 'light straight from the sources'],
  ['emitted', 'light emitted by dust and not scattered'],
  ['scattered', 'light scattered by dust'],
  ['deficit', 'ambient light missing from the line of sight']
]

/**
 * The FITS file of a camera in the camera's unit, axes x (west), y (north), wavelength. The primary HDU is the total;
 * image extensions SIGMA, DIRECT, EMITTED, SCATTERED, where light is polarised Q, SIGMA_Q, U, SIGMA_U, V and SIGMA_V, MODES, with dust COLUMN,
 * the table of wavelengths and that of the stars follow. With ambient fields there is DEFICIT too, whose header holds their intensity beside the dust,
 * `ambient` (cgs, one value a wavelength), in the cards AMBI1, AMBI2 and so on.
 */
export function cameraFits(images: CameraImages, scene: Scene, ambient: number[] = []): Uint8Array {
  const { width, height, camera } = images
  const axes = [width, height, camera.wavelengths.length]
  const common = [card('BUNIT', intensityUnit(camera.unit).fits), ...wcsCards(skyCards(images, scene))]
  const present = planes.filter(([plane]) => images[plane] !== undefined)
  const parts = present.map(([plane, meaning], i) => {
    const name = [card('EXTNAME', plane.toUpperCase()), commentCard(`This image: ${meaning}.`)]
    const origin = i === 0 ? [...originCards(scene), ...viewCards(images)] : []
    const level = plane === 'deficit' ? ambientCards(images, ambient) : []
    const cards = [...name, ...common, ...origin, ...level]
    return imageHdu(i === 0 ? 'primary' : 'extension', axes, planeInUnit(images, plane), cards)
  })
  const stokes = stokesHdus(images, axes, wcsCards(skyCards(images, scene)))
  const stars = images.stars.length > 0 ? [starsTableHdu(images)] : []
  return joined([
    ...parts,
    ...stokes,
    modesHdu(images, scene),
    ...columnHdu(images, scene),
    wavelengthTableHdu(camera.wavelengths),
    ...stars
  ])
}

/** Extensions Q, U, V and their errors; beside magnitudes they are in MJy/sr. */
function stokesHdus(images: CameraImages, axes: number[], wcs: string[]): Uint8Array[] {
  const { stokes, camera } = images
  if (!stokes) return []
  const unit = intensityUnit(stokesUnit(camera.unit))
  const hdu = (name: string, plane: keyof typeof stokes, meaning: string): Uint8Array =>
    imageHdu(
      'extension',
      axes,
      inUnit(images, (context, i) => unit.fromCgs(stokes[plane][i], context)),
      [
        card('EXTNAME', name),
        commentCard(`This image: ${meaning}.`),
        card('BUNIT', unit.fits),
        card('POLCCONV', 'IAU', 'position angle from north through east'),
        ...wcs
      ]
    )
  return STOKES_PAIRS.flatMap(([plane, sigma]) => {
    const name = plane.toUpperCase()
    return [hdu(name, plane, stokesMeaning[plane]), hdu(`SIGMA_${name}`, sigma, `1 sigma of the Monte Carlo part of ${name}`)]
  })
}

const stokesMeaning = {
  q: 'Stokes Q, > 0: electric vector north-south',
  u: 'Stokes U, > 0: electric vector north-east to south-west',
  v: 'Stokes V, > 0: electric vector turns north to east'
}

/** The extension COLUMN, a single image: the column density of all dust. */
function columnHdu(images: CameraImages, scene: Scene): Uint8Array[] {
  const { column, width, height } = images
  if (!column) return []
  const cards = [
    card('EXTNAME', 'COLUMN'),
    commentCard('This image: column density of all dust along the line of sight.'),
    card('BUNIT', 'g cm-2'),
    realCard('PLACING', column.samplingError, 'relative error of placing rays, estimated'),
    card('WCSAXES', 2),
    ...skyCards(images, scene)
  ]
  return [imageHdu('extension', [width, height], column.density, cards)]
}

/** The extension MODES: axes x, y, mode, wavelength. */
function modesHdu(images: CameraImages, scene: Scene): Uint8Array {
  const { modes, width, height, camera } = images
  const count = camera.wavelengths.length
  return stepsHdu([width, height, modes.length / (width * height * count), count], modes, MODE_STEPS, [
    card('EXTNAME', 'MODES'),
    commentCard('This image: the noise behind SIGMA in units of SIGMA (axes x, y, mode, wavelength).'),
    commentCard('What is made linearly of the image has as variance the sum over the modes of'),
    commentCard('the squares of the same made of SIGMA x MODES.'),
    card('WCSAXES', 2),
    ...skyCards(images, scene)
  ])
}

/** The extension STARS, one row a star; their names stand in the cards STAR1, STAR2 and so on. */
function starsTableHdu({ stars, camera }: CameraImages): Uint8Array {
  const angles = (value: (star: StarOnSky) => number, unit = ARCSECOND) => Float64Array.from(stars, (star) => value(star) / unit)
  const fluxes = stars.flatMap(({ flux }) => Array.from(flux, (value) => value / JANSKY))
  return tableHdu(
    'STARS',
    [
      ...(isFromPlace(camera.view)
        ? [
            { name: 'longitude', unit: 'deg', values: angles(({ east }) => east, DEGREE) },
            { name: 'latitude', unit: 'deg', values: angles(({ north }) => north, DEGREE) }
          ]
        : [
            { name: 'east', unit: 'arcsec', values: angles(({ east }) => east) },
            { name: 'north', unit: 'arcsec', values: angles(({ north }) => north) }
          ]),
      { name: 'radius', unit: 'arcsec', values: angles(({ radius }) => radius) },
      { name: 'limb_darkening', values: Float64Array.from(stars, ({ limbDarkening }) => limbDarkening) },
      { name: 'flux', unit: 'Jy', values: Float64Array.from(fluxes), repeat: camera.wavelengths.length }
    ],
    stars.map(({ name }, i) => card(`STAR${i + 1}`, name, 'name of the star in this row'))
  )
}

function ambientCards(images: CameraImages, ambient: number[]): string[] {
  const unit = intensityUnit(images.camera.unit)
  return ambient.flatMap((intensity, k) => {
    const value = unit.fromCgs(intensity, pixelContext(images, k))
    return Number.isFinite(value) ? [realCard(`AMBI${k + 1}`, value, `[BUNIT] ambient light, wavelength ${k + 1}`)] : []
  })
}

function skyCards({ camera, width, height }: CameraImages, { sky }: Scene): string[] {
  const { view, field } = camera
  return isFromPlace(view) ? placeCards(view, { width, height, field }) : celestialCards({ width, height, field }, sky)
}

function viewCards({ camera: { name, view } }: CameraImages): string[] {
  const roll = realCard('ROLL', inDegrees(view.roll), '[deg] projected z axis, east of north')
  const camera = card('CAMERA', name, 'name of the camera')
  if (!isFromPlace(view))
    return [
      camera,
      realCard('INCLIN', inDegrees(view.inclination), '[deg] z axis to the line of sight'),
      realCard('AZIMUTH', inDegrees(view.azimuth), '[deg] turn of the scene about z'),
      roll
    ]
  const place = (key: string, at: Vector, meaning: string) =>
    at.map((component, i) => realCard(`${key}_${'XYZ'[i]}`, component / AU, `[au] ${meaning}`))
  return [
    camera,
    ...place('FROM', view.from, 'place of the observer'),
    ...(view.allSky ? [] : [...place('TO', view.toward, 'what he looks at'), roll])
  ]
}

function planeInUnit(images: CameraImages, plane: Plane): Float64Array {
  const unit = intensityUnit(images.camera.unit)
  return inUnit(images, (context, i) =>
    plane === 'sigma' ? unit.sigmaFromCgs(images.total[i], images.sigma[i], context) : unit.fromCgs(images[plane]![i], context)
  )
}

/** Converts every value of a camera's images, given what its unit depends on. */
function inUnit(images: CameraImages, convert: (context: IntensityContext, i: number) => number): Float64Array {
  const pixels = images.width * images.height
  const values = new Float64Array(images.total.length)
  for (let k = 0; k < images.camera.wavelengths.length; k++) {
    const context = pixelContext(images, k)
    for (let i = k * pixels; i < (k + 1) * pixels; i++) values[i] = convert(context, i)
  }
  return values
}
