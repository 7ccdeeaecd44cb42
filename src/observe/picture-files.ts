import { median } from '../math/stats.js'
import { inferno } from '../output/draw/colours.js'
import { shortNumber } from '../output/draw/numbers.js'
import { card, commentCard, realCard } from '../output/fits/card.js'
import { joined } from '../output/fits/hdu.js'
import { imageHdu } from '../output/fits/image.js'
import { originCards } from '../output/fits/origin-cards.js'
import { celestialCards, wavelengthTableHdu, wcsCards } from '../output/fits/wcs.js'
import { inDegrees } from '../output/in-degrees.js'
import { stretchNote } from '../output/png/caption.js'
import { intensityScale, quantityIn } from '../output/png/intensity-scale.js'
import { panelSize } from '../output/png/panel-size.js'
import { beamMark, type SkyPanel } from '../output/png/sky-marks.js'
import { skyPicture } from '../output/png/sky-picture.js'
import { stretched } from '../output/png/stretch.js'
import { spacedWavelength, wavelengthLabel } from '../output/wavelength-label.js'
import { ARCSECOND } from '../units/angles.js'
import type { Picture } from './picture.js'
import type { CameraSource } from './run-source.js'
import { COUNTS } from './unit.js'

const planes: [keyof Picture & ('observed' | 'sigma' | 'noise' | 'expected'), string, string][] = [
  ['observed', 'OBSERVED', 'what the instrument records'],
  ['sigma', 'SIGMA', '1 sigma of the Monte Carlo part of the run'],
  ['noise', 'NOISE', '1 sigma of the noise of the instrument'],
  ['expected', 'EXPECTED', 'the same without noise']
]

/**
 * The FITS file of an observed picture, with the conventions of a run's: axes x (west), y (north), wavelength. The primary HDU is
 * what was observed; SIGMA, NOISE (where there is any) and EXPECTED follow. NaN under the mask.
 */
export function pictureFits(picture: Picture, source: CameraSource, title: string): Uint8Array {
  const { grid, unit, wavelength, noise } = picture
  const common = [
    card('BUNIT', unit.fits),
    ...wcsCards(celestialCards({ ...grid, field: fieldOf(picture) }, source.sky)),
    ...beamCards(picture)
  ]
  const parts = planes
    .filter(([plane]) => plane !== 'noise' || noise)
    .map(([plane, name, meaning], i) => {
      const head = [card('EXTNAME', name), commentCard(`This image: ${meaning}.`)]
      const origin = i === 0 ? [...originCards({ title, distance: source.distance }), ...instrumentCards(picture, source)] : []
      const axes = [grid.width, grid.height, 1]
      return imageHdu(i === 0 ? 'primary' : 'extension', axes, planeInUnit(picture, plane), [...head, ...common, ...origin])
    })
  return joined([...parts, wavelengthTableHdu([wavelength])])
}

function planeInUnit({ unit, context, expected, ...picture }: Picture, plane: (typeof planes)[number][0]): Float64Array {
  if (plane === 'observed') return picture.observed.map((value) => unit.fromCgs(value, context))
  if (plane === 'expected') return expected.map((value) => unit.fromCgs(value, context))
  const sigma = picture[plane]!
  return sigma.map((value, i) => unit.sigmaFromCgs(expected[i], value, context))
}

function beamCards({ beam, spec }: Picture): string[] {
  if (!beam) return []
  const { ellipse } = beam
  return [
    ...(ellipse
      ? [
          realCard('BMAJ', inDegrees(ellipse.major), '[deg] beam, full width at half maximum'),
          realCard('BMIN', inDegrees(ellipse.minor), '[deg]'),
          realCard('BPA', inDegrees(ellipse.positionAngle), '[deg] east of north')
        ]
      : []),
    realCard('BEAMSR', beam.solidAngle, '[sr] solid angle of the beam'),
    card('BEAMKIND', spec.beam!.kind)
  ]
}

function instrumentCards({ spec, masked }: Picture, source: CameraSource): string[] {
  const { core, noise } = spec
  return [
    card('OBSERVED', spec.name, 'name of the observation'),
    card('CAMERA', source.name, 'camera of the run'),
    ...(noise?.kind === 'exposure' ? [realCard('EXPTIME', noise.time, '[s] exposure')] : []),
    ...(core ? [realCard('MASKED', core.radius / ARCSECOND, `[arcsec] radius of the mask: ${masked} pixels`)] : [])
  ]
}

/** The picture (PNG) of what was observed. */
export function picturePng(picture: Picture, source: CameraSource, title: string): Uint8Array {
  const { spec, grid, unit, context, beam, wavelength, observed: values, noise } = picture
  const ellipse = beam?.ellipse
  const widths = ellipse && `beam ${shortNumber(ellipse.major / ARCSECOND)} × ${shortNumber(ellipse.minor / ARCSECOND)} arcsec`
  const light = `${spec.light.kind === 'band' ? 'band about ' : ''}${spacedWavelength(wavelengthLabel(wavelength))}`
  const subtitle = [spec.name, `camera ${source.name}`, light, ...(widths ? [widths] : []), ...(noise ? [] : ['no noise'])]
  const view = { ...grid, field: fieldOf(picture), distance: source.distance, title, subtitle: subtitle.join(' · ') }
  const size = panelSize(view)
  const shown = {
    quantity: unit.name === COUNTS ? 'counts in a pixel' : spec.zeroMagnitude ? 'surface brightness' : quantityIn(unit.name),
    unit: { name: unit.name, fromCgs: (value: number) => unit.fromCgs(value, context) },
    ...(noise && { noise: median(noise.filter(Number.isFinite)) })
  }
  const scale = intensityScale(shown, values, size[1])
  const colour = (value: number) => stretched(value, scale.stretch)
  const marks = (panel: SkyPanel) => (ellipse ? beamMark(panel, ellipse, view.field) : [])
  return skyPicture(view, { values, size, map: inferno, colour, ...scale, marks, note: stretchNote(scale) })
}

function fieldOf({ grid: { width, height, pixel } }: Picture): [number, number] {
  return [width * pixel[0], height * pixel[1]]
}
