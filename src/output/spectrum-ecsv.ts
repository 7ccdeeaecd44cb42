import type { ApertureSpectrum } from '../camera/types.js'
import type { Scene } from '../scene/types.js'
import { ARCSECOND } from '../units/angles.js'
import { LIGHT_SPEED, PARSEC } from '../units/constants.js'
import { fluxUnit } from '../units/flux.js'
import { type EcsvColumn, ecsv } from './ecsv.js'
import { inDegrees } from './in-degrees.js'
import { spectrumInUnit } from './spectrum-in-unit.js'
import { stokesUnit } from './stokes-unit.js'
import { version } from './version.js'

/**
 * The ECSV file of a spectrum: wavelength (um), then flux, sigma, direct, emitted and scattered in the spectrum's unit, and where
 * light is polarised Stokes Q and U with their errors, in Jy beside magnitudes.
 */
export function spectrumEcsv(spectrum: ApertureSpectrum, scene: Scene): string {
  const { spectrum: spec } = spectrum
  const unit = fluxUnit(spec.unit).fits
  const values = spectrumInUnit(spectrum)
  const columns: EcsvColumn[] = [
    { name: 'wavelength', unit: 'um', description: 'vacuum wavelength', values: values.wavelengthUm },
    { name: 'flux', unit, description: 'total in the aperture', values: values.total },
    { name: 'sigma', unit, description: '1 sigma of the Monte Carlo part', values: values.sigma },
    { name: 'direct', unit, description: 'straight from the sources', values: values.direct },
    { name: 'emitted', unit, description: 'emitted by dust and not scattered', values: values.emitted },
    { name: 'scattered', unit, description: 'scattered by dust', values: values.scattered },
    ...(values.deficit
      ? [{ name: 'deficit', unit, description: 'ambient light missing in the aperture, not in the flux', values: values.deficit }]
      : []),
    ...stokesColumns(spectrum)
  ]
  return ecsv(columns, {
    origin: `motelight ${version}`,
    title: scene.title,
    spectrum: spec.name,
    distance_pc: scene.distance / PARSEC,
    inclination_deg: inDegrees(spec.view.inclination),
    azimuth_deg: inDegrees(spec.view.azimuth),
    aperture_radius_arcsec: Number.isFinite(spec.aperture) ? Number((spec.aperture / ARCSECOND).toPrecision(15)) : 'all'
  })
}

function stokesColumns({ stokes, spectrum: spec }: ApertureSpectrum): EcsvColumn[] {
  if (!stokes) return []
  const unit = fluxUnit(stokesUnit(spec.unit))
  const column = (name: string, plane: 'q' | 'u' | 'sigmaQ' | 'sigmaU', description: string): EcsvColumn => ({
    name,
    unit: unit.fits,
    description,
    values: stokes[plane].map((value, k) => unit.fromCgs(value, { frequencyHz: LIGHT_SPEED / spec.wavelengths[k] }))
  })
  return [
    column('q', 'q', 'Stokes Q (IAU), > 0: electric vector north-south'),
    column('sigma_q', 'sigmaQ', '1 sigma of the Monte Carlo part of q'),
    column('u', 'u', 'Stokes U (IAU), > 0: electric vector north-east to south-west'),
    column('sigma_u', 'sigmaU', '1 sigma of the Monte Carlo part of u')
  ]
}
