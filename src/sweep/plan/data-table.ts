import { type Column, parseCsvTable } from '../../scene/csv-table.js'
import { JANSKY, LIGHT_SPEED } from '../../units/constants.js'
import { fluxUnit } from '../../units/flux.js'
import type { DataSet } from '../types.js'

const lengths: Record<string, number> = { um: 1e-4, nm: 1e-7, angstrom: 1e-8, mm: 0.1, cm: 1, m: 100 }
const fluxes = ['Jy', 'mJy', 'uJy', 'erg/s/cm2/Hz', 'W/m2/Hz', 'W/m2/um', 'erg/s/cm2/angstrom', 'W/m2', 'erg/s/cm2']
const positive = (value: number) => (value > 0 ? undefined : 'must be greater than 0')

/**
 * Reads measured fluxes: columns wavelength, flux and sigma (1 sigma, same unit as the flux), units in the header. The
 * wavelengths come back in cm and increase, fluxes in Jy. Throws SceneError.
 */
export function parseDataTable(text: string, file: string): Pick<DataSet, 'wavelengths' | 'fluxJy' | 'sigmaJy'> {
  const raw = Object.fromEntries(fluxes.map((unit) => [unit, (value: number) => value]))
  const unitOf = (column: string) =>
    new RegExp(String.raw`(?:^|,)\s*${column}\s*\[\s*([^\]]*?)\s*\]`, 'm').exec(text)?.[1] ?? 'Jy'
  const accepted: Column[] = [
    {
      name: 'wavelength',
      units: Object.fromEntries(Object.entries(lengths).map(([unit, size]) => [unit, (value: number) => value * size])),
      refuse: positive
    },
    { name: 'flux', units: raw, refuse: () => undefined },
    { name: 'sigma', units: raw, refuse: positive }
  ]
  const { columns, lines } = parseCsvTable(text, file, accepted)
  const wavelength = columns.get('wavelength')!
  const order = lines.map((_, row) => row).sort((a, b) => wavelength[a] - wavelength[b])
  const inJansky = (column: string) => {
    const unit = fluxUnit(unitOf(column))
    return order.map((row) => unit.toCgs(columns.get(column)![row], { frequencyHz: LIGHT_SPEED / wavelength[row] }) / JANSKY)
  }
  return { wavelengths: order.map((row) => wavelength[row]), fluxJy: inJansky('flux'), sigmaJy: inJansky('sigma') }
}
