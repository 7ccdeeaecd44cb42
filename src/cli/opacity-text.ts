import { interpolateLinear } from '../math/interp.js'
import type { OpacityReport } from '../run/opacity-report.js'
import { shown, table, wavelengthText } from './words.js'

const SHOWN_UM = [0.1, 0.2, 0.55, 1, 2.2, 5, 10, 20, 60, 100, 1000]
const SHOWN_K = [10, 30, 100, 300, 1000, 3000]

/** What `opacity` says: a few rows of each table. */
export function opacityText(reports: OpacityReport[], folder: string): string {
  return [...reports.flatMap(section), `Tables and plots are in ${folder}.`, ''].join('\n')
}

function section({ name, law, phase, curves, means }: OpacityReport): string[] {
  const rows = SHOWN_UM.map((um) => {
    const at = (values: Float64Array) => shown(interpolateLinear(curves.wavelengthUm, values, um))
    return [wavelengthText(um), at(curves.absorption), at(curves.scattering), at(curves.albedo), at(curves.asymmetry)]
  })
  const temperatures = SHOWN_K.map((kelvin) => {
    const at = (values: Float64Array) => shown(interpolateLinear(means.temperatureK, values, kelvin))
    return [`${kelvin} K`, at(means.planck), at(means.rosseland)]
  })
  return [
    `${name}: ${law}, scattering ${phase}; opacities in cm2/g of dust`,
    ...table([['wavelength', 'absorption', 'scattering', 'albedo', 'asymmetry'], ...rows]),
    ...table([['temperature', 'Planck mean', 'Rosseland mean'], ...temperatures]),
    ''
  ]
}
