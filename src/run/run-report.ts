import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { shellWord } from '../output/shell-word.js'
import { digits } from '../report/digits.js'
import { readSpectrumChart, readStructureCharts } from '../report/read-charts.js'
import { isFlat, readPictures } from '../report/read-picture.js'
import { reportPage } from '../report/report-page.js'
import type { ChartSection, TableSection } from '../report/types.js'
import type { DustFinding } from './findings.js'
import { percent } from './percent.js'
import type { RunRecord } from './run-record.js'
import type { PhaseTime } from './stopwatch.js'

/** Pictures of cameras at places of the scene on a page, at most. */
const MOST_DRAWN = 12

const columnPlane = { name: 'COLUMN', meaning: 'column density' }

/** The page of a run, from its record and the files in its folder. Throws a DataError for a file that cannot be used. */
export function runReport(path: string, record: RunRecord): string {
  const at = (file: string) => join(path, file)
  const named = (folder: string, ending: string) =>
    record.files.filter((file) => file.startsWith(folder) && file.endsWith(ending))
  const nameOf = (file: string) => file.replace(/^[^/]*\//, '').replace(/\.[a-z]+$/, '')
  const cameras = named('images/', '.fits').map((file) => ({ path: at(file), file, heading: `Camera ${nameOf(file)}` }))
  const images = cameras.filter(({ path }) => isFlat(path))
  const columns = images
    .filter(({ file }) => record.files.includes(file.replace(/\.fits$/, '-column.png')))
    .map((from) => ({ ...from, heading: `${from.heading}: dust along the line of sight`, planes: [columnPlane] }))
  // They take little of a page's room, and come first where it is shared.
  const { pictures, leftOut } = readPictures([...columns, ...images])
  const spectra = named('spectra/', '.ecsv').map((file) => readSpectrumChart(at(file), file, `Spectrum ${nameOf(file)}`))
  const places = cameras.filter((camera) => !images.includes(camera)).map(({ file }) => nameOf(file))
  const charts: ChartSection[] = [
    placesSection(record, places, at),
    { heading: 'Spectra', charts: spectra, pictures: [], tables: [] },
    dustSection(record, at)
  ]
  return reportPage({
    title: record.title,
    summary: summaryOf(record),
    warnings: [...record.warnings, ...leftOut],
    pictures: [
      ...pictures.filter(({ planes }) => planes[0] !== columnPlane),
      ...pictures.filter(({ planes }) => planes[0] === columnPlane)
    ],
    charts,
    tables: [energyTable(record), precisionTable(record), packetsTable(record)],
    texts: existsSync(at('scene.yaml'))
      ? [{ heading: 'Scene', name: 'scene.yaml, as run: every default filled in', text: readFileSync(at('scene.yaml'), 'utf8') }]
      : [],
    reproduce: {
      commands: [runCommand(record)],
      remarks: [
        `Made with motelight ${record.version} and ${record.workers} workers, begun ${record.started}. The same version, files and seed give the same bits with any number of workers.`
      ],
      inputs: record.inputs
    }
  })
}

function runCommand({ scene, seed, estimator }: RunRecord): string {
  const estimate = estimator === 'emissivity' ? [] : ['--estimator', estimator]
  return ['motelight', 'run', scene, '--seed', seed, ...estimate].map(shellWord).join(' ')
}

function summaryOf({ precision, cells, warnings }: RunRecord): string {
  const noise = precision.observers.flatMap(({ wavelengths }) => wavelengths.map(({ photonNoise }) => photonNoise))
  const worst = noise.length > 0 ? `largest 1 sigma ${percent(Math.max(...noise))}` : 'nothing observed'
  const asked =
    precision.asked === null
      ? 'packets fixed'
      : `asked for ${percent(precision.asked)}, ${precision.reached ? 'reached' : 'not reached'}`
  const doubt = warnings.length === 0 ? 'no warnings' : `${warnings.length} ${warnings.length === 1 ? 'warning' : 'warnings'}`
  return `Model run: ${worst} (${asked}); ${cells.count} cells, ${cells.dimensions === 1 ? 'one dimension' : `${cells.dimensions} dimensions`}; ${doubt}.`
}

/** The pictures of cameras at places of the scene, as they were drawn: their axes are angles that the page does not know. */
function placesSection({ files }: RunRecord, names: string[], at: (file: string) => string): ChartSection {
  const drawn = names.flatMap((name) => files.filter((file) => file.startsWith(`images/${name}-`) && file.endsWith('.png')))
  const shown = drawn.slice(0, MOST_DRAWN).filter((file) => existsSync(at(file)))
  return {
    heading: 'Views from places of the scene',
    charts: [],
    pictures: shown.map((file) => ({ alt: file, base64: readFileSync(at(file)).toString('base64') })),
    tables: []
  }
}

function dustSection({ found, files }: RunRecord, at: (file: string) => string): ChartSection {
  const cells = 'dust/cells.fits'
  const charts = files.includes(cells) ? readStructureCharts(at(cells), cells) : []
  const drawn = charts.length > 0 ? [] : ['dust/structure.png', 'dust/planes.png'].filter((file) => existsSync(at(file)))
  return {
    heading: 'Dust',
    charts,
    pictures: drawn.map((file) => ({
      alt: `Maps of temperature and density of the dust: ${file}`,
      base64: readFileSync(at(file)).toString('base64')
    })),
    tables: [
      {
        heading: 'Components',
        columns: ['', 'mass (Msun)', 'inner edge (K)', 'hottest (K)', 'at (au)', 'coldest (K)', 'at (au)'],
        rows: found.dust.map(dustRow)
      }
    ]
  }
}

function dustRow({ name, massMsun, temperatures }: DustFinding): string[] {
  const kelvin = (cell: { kelvin: number; sigmaKelvin: number }) => `${digits(cell.kelvin)} ± ${digits(cell.sigmaKelvin, 2)}`
  const mass = digits(massMsun, 4)
  if (!temperatures) return [name, mass, 'does not emit', '', '', '', '']
  const { innerEdge, hottest, coldest } = temperatures
  return [
    name,
    mass,
    kelvin(innerEdge),
    kelvin(hottest),
    digits(hottest.radiusAu, 4),
    kelvin(coldest),
    digits(coldest.radiusAu, 4)
  ]
}

function energyTable({ energy }: RunRecord): TableSection {
  const rows = energy
    ? (['emitted', 'ambient', 'escaped', 'returned', 'kept'] as const)
        .filter((part) => part === 'emitted' || energy[part] !== 0)
        .map((part) => [meanings[part], digits(energy[part]), percent(energy[part] / energy.emitted)])
    : []
  return {
    heading: 'Energy',
    columns: ['last round of the temperatures', 'erg/s', 'of emitted'],
    rows,
    note: energy && `Balance, (emitted − escaped − returned − kept) / emitted: ${digits(energy.balance, 2)}.`
  }
}

const meanings = {
  emitted: 'emitted by all sources',
  ambient: 'of it, sent in by ambient light',
  escaped: 'escaped',
  returned: 'back to stars',
  kept: 'kept by dust of fixed temperature'
}

function precisionTable({ precision }: RunRecord): TableSection {
  const worst = (values: number[]) => percent(Math.max(...values))
  return {
    heading: 'Precision',
    columns: ['', 'wavelengths', 'largest 1 sigma', 'largest error of placing rays'],
    rows: precision.observers.map(({ kind, name, wavelengths }) => [
      `${kind} ${name}`,
      String(wavelengths.length),
      worst(wavelengths.map(({ photonNoise }) => photonNoise)),
      worst(wavelengths.map(({ samplingError }) => samplingError))
    ])
  }
}

function packetsTable({ packets, times }: RunRecord): TableSection {
  const light = packets.light.reduce((sum, { packets: count }) => sum + count, 0)
  const row = (what: string, count: number, { wallSeconds, cpuSeconds }: PhaseTime) => [
    what,
    count === 0 ? '' : digits(count, 7),
    wallSeconds.toFixed(1),
    cpuSeconds.toFixed(1)
  ]
  return {
    heading: 'Packets and times',
    columns: ['', 'packets', 'seconds', 'processor seconds'],
    rows: [
      row('model', 0, times.model),
      row('temperatures', packets.equilibrium, times.dust),
      row('images and spectra', light, times.light)
    ]
  }
}
