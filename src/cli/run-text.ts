import type { DustFinding, Findings } from '../run/findings.js'
import type { RunRecord } from '../run/run-record.js'
import { duration, shown, some, table, wavelengthText, withError } from './words.js'

/** Wavelengths shown of a long list; the files have them all. */
const FEW = 4

/** What `run` says at its end. */
export function runText(record: RunRecord, folder: string): string {
  const { found } = record
  return [
    record.title,
    ...table(found.dust.flatMap(dustRows)),
    ...table(groups(found.spectra, 'spectrum').flatMap((rows) => some(rows, FEW).map(spectrumRow))),
    ...table(groups(found.images, 'camera').flatMap((rows) => some(rows, FEW).map(imageRow))),
    ...precisionLines(record),
    ...energyLines(record),
    `  ${packetsText(record)} in ${duration(wallSeconds(record))} with ${record.workers} ${record.workers === 1 ? 'worker' : 'workers'}`,
    ...record.warnings.map((warning) => `  warning: ${warning}`),
    `Results are in ${folder}${picturesText(record)}`,
    ''
  ].join('\n')
}

function dustRows({ name, massMsun, sublimatedMsun = 0, innerRadius, temperatures }: DustFinding): string[][] {
  const found = innerRadius && `${withError(innerRadius.au, innerRadius.sigmaAu)} au at ${innerRadius.kelvin} K`
  const mass = [
    `dust ${name}`,
    `${shown(massMsun)} Msun`,
    ...(sublimatedMsun > 0 ? [`${shown(sublimatedMsun)} Msun sublimated`] : []),
    ...(found ? [`inner radius ${found}`] : [])
  ]
  if (!temperatures) return [mass]
  const { hottest, innerEdge, coldest } = temperatures
  const at = ({ kelvin, sigmaKelvin, radiusAu }: typeof hottest) => `${withError(kelvin, sigmaKelvin)} K at ${shown(radiusAu)} au`
  return [[...mass, `inner edge ${at(innerEdge)}`, `hottest ${at(hottest)}`, `coldest ${at(coldest)}`]]
}

function spectrumRow({ spectrum, wavelengthUm, flux, sigma, unit }: Findings['spectra'][number]): string[] {
  return [`spectrum ${spectrum}`, wavelengthText(wavelengthUm), `${withError(flux, sigma)} ${unit}`]
}

function imageRow({ camera, wavelengthUm, peak, peakSigma, unit, fluxJy, fluxSigmaJy }: Findings['images'][number]): string[] {
  return [
    `camera ${camera}`,
    wavelengthText(wavelengthUm),
    `peak ${withError(peak, peakSigma)} ${unit}`,
    `field ${withError(fluxJy, fluxSigmaJy)} Jy`
  ]
}

function groups<Row, Key extends keyof Row>(rows: Row[], key: Key): Row[][] {
  return [...new Set(rows.map((row) => row[key]))].map((value) => rows.filter((row) => row[key] === value))
}

function precisionLines({ precision: { asked, reached, observers } }: RunRecord): string[] {
  const all = observers.flatMap(({ wavelengths }) => wavelengths)
  if (all.length === 0) return []
  const worst = (values: number[]) => `${shown(100 * Math.max(...values), 2)} %`
  const reachedText = `largest 1 sigma ${worst(all.map(({ photonNoise }) => photonNoise))}, error of placing rays ${worst(all.map(({ samplingError }) => samplingError))}`
  const aim = asked === null ? '' : `; asked for ${shown(100 * asked, 2)} %, ${reached ? 'reached' : 'not reached'}`
  return [`  precision: ${reachedText}${aim}`]
}

function energyLines({ energy }: RunRecord): string[] {
  if (!energy) return []
  const share = (value: number) => `${shown((100 * value) / energy.emitted, 4)} %`
  return [
    `  energy: ${shown(energy.emitted)} erg/s emitted${energy.ambient > 0 ? ` or let in (${share(energy.ambient)} ambient)` : ''}, ${share(energy.escaped)} escaped, ${share(energy.returned)} back to sources, balance ${energy.balance === 0 ? 0 : energy.balance.toExponential(0)}`
  ]
}

function packetsText({ packets }: RunRecord): string {
  const all = packets.light.reduce((sum, { packets: count }) => sum + count, packets.equilibrium)
  return `${shown(all)} packets`
}

function wallSeconds({ times }: RunRecord): number {
  return Object.values(times).reduce((sum, { wallSeconds }) => sum + wallSeconds, 0)
}

function picturesText({ files }: RunRecord): string {
  const kinds = [
    [files.filter((file) => file.startsWith('images/') && file.endsWith('.png')).length, 'picture', 'images'],
    [files.filter((file) => file.startsWith('spectra/') && file.endsWith('.png')).length, 'plot', 'spectra'],
    [files.filter((file) => file.startsWith('dust/') && file.endsWith('.png')).length, 'plot', 'dust']
  ].filter(([count]) => Number(count) > 0)
  return kinds.length > 0
    ? `: ${kinds.map(([count, what, folder]) => `${count} ${what}${count === 1 ? '' : 's'} in ${folder}`).join(', ')}`
    : ''
}
