import type { SceneCheck } from '../run/check-scene.js'
import { duration, shown, some, table, wavelengthText } from './words.js'

/** Wavelengths shown of a long list; `--json` has them all. */
const FEW = 5

/** What `check` says. */
export function checkText(check: SceneCheck): string {
  return [
    `${check.title} (${check.scene}), at ${shown(check.distancePc)} pc, seed ${check.seed}`,
    ...section('Sources', sources(check)),
    ...section('Ambient light', ambient(check)),
    ...section('Dust', dust(check)),
    ...section('Optical depth of each component', componentDepths(check)),
    ...section('Optical depth from the observer to the centre', observerDepths(check)),
    ...section('Cells', cells(check)),
    ...section('Cost', cost(check)),
    ...section(
      'Warnings',
      check.warnings.map((warning) => `  ${warning}`)
    ),
    ''
  ].join('\n')
}

function section(title: string, lines: string[]): string[] {
  return lines.length > 0 ? ['', title, ...lines] : []
}

function sources({ sources }: SceneCheck): string[] {
  return table(
    sources.map(({ name, extent, spectrum, temperatureK, luminosityLsun, radiusRsun }) => [
      name,
      extent,
      temperatureK === undefined ? '' : `${shown(temperatureK, 4)} K`,
      `${shown(luminosityLsun, 4)} Lsun`,
      radiusRsun === undefined ? '' : `${shown(radiusRsun, 4)} Rsun`,
      spectrum
    ])
  )
}

function ambient({ ambient }: SceneCheck): string[] {
  return table(
    ambient.map(({ name, spectrum, intensity, inflowLsun }) => [
      name,
      spectrum,
      `4 pi J ${shown(intensity)} erg/s/cm2`,
      `${shown(inflowLsun)} Lsun enter the cells`
    ])
  )
}

function dust({ dust }: SceneCheck): string[] {
  return table(
    dust.map(({ name, opacity, shape, temperature, innerAu, innerSoughtK, sublimationK, outerAu, massMsun }) => [
      name,
      `${shape} of ${opacity}`,
      `${shown(innerAu)} to ${shown(outerAu)} au`,
      `${shown(massMsun)} Msun`,
      temperatureText(temperature),
      [
        ...(innerSoughtK === undefined ? [] : [`inner radius guessed: run seeks where it has ${innerSoughtK} K`]),
        ...(sublimationK === undefined ? [] : [`run removes what is hotter than ${sublimationK} K`])
      ].join(', ')
    ])
  )
}

function temperatureText(temperature: string | number): string {
  if (typeof temperature === 'number') return `${temperature} K`
  return temperature === 'solve' ? 'temperature solved for' : 'no emission'
}

function componentDepths({ opticalDepths: { components } }: SceneCheck): string[] {
  return table(components.map(({ name, line, wavelengths }) => [name, `along its ${line}`, ...depths(wavelengths)]))
}

function observerDepths({ opticalDepths: { observers } }: SceneCheck): string[] {
  return table(
    observers.map(({ kind, name, inclinationDeg, wavelengths }) => [
      `${kind} ${name}`,
      inclinationDeg === undefined ? 'from its place' : `inclination ${inclinationDeg} deg`,
      ...depths(wavelengths)
    ])
  )
}

function depths(wavelengths: { wavelengthUm: number; opticalDepth: number }[]): string[] {
  return some(wavelengths, FEW).map(({ wavelengthUm, opticalDepth }) => `${wavelengthText(wavelengthUm)}: ${shown(opticalDepth)}`)
}

function cells({ cells }: SceneCheck): string[] {
  const layout =
    'radial' in cells
      ? `${cells.radial} in radius, ${cells.polar} in polar angle, ${cells.azimuthal} in azimuth`
      : `cubes of ${shown(cells.finestAu)} au and more, in one of ${shown(cells.widthAu)} au`
  return [`  ${cells.count}: ${layout}`, `  ${cells.reason}`]
}

function cost({ memoryBytes, workers, precision, forecast: { seconds, complete } }: SceneCheck): string[] {
  const parts = `dust ${duration(seconds.dust)}, scattered light ${duration(seconds.light)}, pictures ${duration(seconds.pictures)}`
  const aim = precision === null ? 'exactly the packets given' : `a precision of ${Number((100 * precision).toPrecision(2))} %`
  const time = complete
    ? `about ${duration(seconds.all)} (${parts})`
    : `long${seconds.all < 1 ? '' : `, more than ${duration(seconds.all)}`}: a trial of a few packets did not come to its end`
  return [`  ${workers} workers, ${aim}`, `  time ${time}`, `  memory about ${shown(memoryBytes / 1e6, 2)} MB`]
}
