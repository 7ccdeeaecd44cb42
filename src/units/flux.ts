import { JANSKY, LIGHT_SPEED } from './constants.js'
import { linearUnit, magnitudeUnit, type SpectralUnit } from './spectral-unit.js'

/** What the size of a flux unit depends on. */
export interface FluxContext {
  frequencyHz: number
}

/** F_nu (erg/s/cm2/Hz) of F_lambda = 1 erg/s/cm2/cm: F_nu = F_lambda c / nu^2. */
const perCentimetre = ({ frequencyHz }: FluxContext): number => LIGHT_SPEED / frequencyHz ** 2

const units: SpectralUnit<FluxContext>[] = [
  linearUnit('Jy', 'Jy', () => JANSKY),
  linearUnit('mJy', 'mJy', () => 1e-3 * JANSKY),
  linearUnit('uJy', 'uJy', () => 1e-6 * JANSKY),
  linearUnit('erg/s/cm2/Hz', 'erg s-1 cm-2 Hz-1', () => 1),
  linearUnit('W/m2/Hz', 'W m-2 Hz-1', () => 1e3),
  linearUnit('W/m2/um', 'W m-2 um-1', (context) => 1e3 * 1e4 * perCentimetre(context)),
  linearUnit('erg/s/cm2/angstrom', 'erg s-1 cm-2 Angstrom-1', (context) => 1e8 * perCentimetre(context)),
  // nu F_nu
  linearUnit('W/m2', 'W m-2', ({ frequencyHz }) => 1e3 / frequencyHz),
  linearUnit('erg/s/cm2', 'erg s-1 cm-2', ({ frequencyHz }) => 1 / frequencyHz),
  magnitudeUnit('mag', 'mag', 1)
]

/** Names of all flux-density units. */
export const fluxUnits: string[] = units.map((unit) => unit.name)

/** The flux unit of that name; throws a RangeError for a name not in `fluxUnits`. */
export function fluxUnit(name: string): SpectralUnit<FluxContext> {
  const unit = units.find((candidate) => candidate.name === name)
  if (!unit) throw new RangeError(`no flux unit ${name}`)
  return unit
}
