import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { shellWord } from '../output/shell-word.js'
import { digits } from '../report/digits.js'
import { readPhotometryChart, readVisibilityChart } from '../report/read-charts.js'
import { readPictures } from '../report/read-picture.js'
import { reportPage } from '../report/report-page.js'
import type { ChartSection, TableSection } from '../report/types.js'
import type { ObservationFinding, ObservationRecord } from './observation-record.js'

/** The page of an observation, from its record and the files in its folder. Throws a DataError for a file that cannot be used. */
export function observationReport(path: string, record: ObservationRecord): string {
  const at = (file: string) => join(path, file)
  const files = ofKind(record.observations, 'picture').map(({ name }) => {
    const file = `pictures/${name}.fits`
    return { path: at(file), file, heading: `Picture ${name}` }
  })
  const { pictures, leftOut } = readPictures(files)
  const curves = ofKind(record.observations, 'visibilities').map(({ name }) => {
    const file = `visibilities/${name}-curve.ecsv`
    return readVisibilityChart(at(file), file, `${name}: mean over all directions`)
  })
  const photometry = 'photometry.ecsv'
  const section = (heading: string, charts: ChartSection['charts']): ChartSection => ({
    heading,
    charts,
    pictures: [],
    tables: []
  })
  return reportPage({
    title: record.title,
    summary: `Observation of the run “${record.run.title}”: ${record.observations.map(({ name }) => name).join(', ')}.`,
    warnings: [...record.warnings, ...leftOut],
    pictures,
    charts: [
      section('Fluxes', record.files.includes(photometry) ? [readPhotometryChart(at(photometry), photometry)] : []),
      section('Visibilities', curves)
    ],
    tables: [pictureTable(record.observations), fluxTable(record.observations), visibilityTable(record.observations)],
    texts: [{ heading: 'Instrument', name: 'instrument.yaml', text: readFileSync(at('instrument.yaml'), 'utf8') }],
    reproduce: {
      commands: [['motelight', 'observe', record.run.folder, record.instrument, '--seed', record.seed].map(shellWord).join(' ')],
      remarks: [`Made with motelight ${record.version} of a run made with ${record.run.version}, seed ${record.run.seed}.`],
      inputs: [...record.inputs, ...record.run.inputs]
    }
  })
}

type Finding<Kind> = Extract<ObservationFinding, { kind: Kind }>

const ofKind = <Kind extends ObservationFinding['kind']>(all: ObservationFinding[], kind: Kind) =>
  all.filter((finding): finding is Finding<Kind> & ObservationFinding => finding.kind === kind)

function pictureTable(all: ObservationFinding[]): TableSection {
  return {
    heading: 'Brightest pixels',
    columns: [
      '',
      'µm',
      'peak',
      'noise',
      '1 sigma of the run',
      'unit',
      'flux in the field (Jy)',
      'in the picture (Jy)',
      'masked pixels'
    ],
    rows: ofKind(all, 'picture').map(
      ({ name, wavelengthUm, peak, peakNoise, peakSigma, unit, fieldJy, pictureJy, maskedPixels }) => [
        name,
        digits(wavelengthUm),
        digits(peak),
        digits(peakNoise, 2),
        digits(peakSigma, 2),
        unit,
        digits(fieldJy),
        digits(pictureJy),
        String(maskedPixels)
      ]
    )
  }
}

function fluxTable(all: ObservationFinding[]): TableSection {
  return {
    heading: 'Measured fluxes',
    columns: ['', 'µm', 'value', 'noise', '1 sigma of the run', 'unit'],
    rows: ofKind(all, 'photometry').map(({ name, wavelengthUm, value, valueNoise, valueSigma, unit }) => [
      name,
      digits(wavelengthUm),
      digits(value),
      digits(valueNoise, 2),
      digits(valueSigma, 2),
      unit
    ])
  }
}

function visibilityTable(all: ObservationFinding[]): TableSection {
  return {
    heading: 'Interferometry',
    columns: ['', 'µm', 'baselines', 'closure phases', 'flux (Jy)', 'noise (Jy)'],
    rows: ofKind(all, 'visibilities').map(({ name, wavelengthUm, baselines, closurePhases, fluxJy, noiseJy }) => [
      name,
      digits(wavelengthUm),
      String(baselines),
      String(closurePhases),
      digits(fluxJy),
      digits(noiseJy, 2)
    ])
  }
}
