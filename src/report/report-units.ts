import type { SpectralUnit } from '../units/spectral-unit.js'
import type { ReportUnit } from './types.js'

/**
 * The units that values can be shown in, that of the values first; `fits` is its name in the file, `contexts` what conversion depends on
 * at each wavelength. A unit not known here stands alone.
 */
export function reportUnits<Context>(fits: string, candidates: SpectralUnit<Context>[], contexts: Context[]): ReportUnit[] {
  const own = candidates.find((unit) => unit.fits === fits)
  if (!own) return [{ name: fits, kind: fits.startsWith('mag') ? 'magnitude' : 'linear', cgs: contexts.map(() => 1) }]
  return [own, ...candidates.filter((unit) => unit !== own)].map((unit) => {
    const magnitude = unit.name.startsWith('mag')
    return {
      name: unit.name,
      kind: magnitude ? 'magnitude' : 'linear',
      cgs: contexts.map((context) => unit.toCgs(magnitude ? 0 : 1, context))
    }
  })
}
