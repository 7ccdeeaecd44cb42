import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { pixelMatrix } from '../data/fits/pixel-matrix.js'
import { readFits } from '../data/fits/read.js'
import { shellWord } from '../output/shell-word.js'
import { digits } from '../report/digits.js'
import { readModelChart } from '../report/read-charts.js'
import { type PictureFile, readPictures } from '../report/read-picture.js'
import { reportPage } from '../report/report-page.js'
import type { ChartSection, TableSection } from '../report/types.js'
import type { ComparisonRecord } from './comparison-record.js'
import { plotsOf } from './set-plots.js'
import type { Agreement, SetFinding } from './verdict.js'

const offsetNote = 'Pixels are those of the data; offsets are from the middle of the picture.'

/** The page of a comparison, from its record and the files in its folder. Throws a DataError for a file that cannot be used. */
export function comparisonReport(path: string, record: ComparisonRecord): string {
  const at = (file: string) => join(path, file)
  const images = record.sets.filter(({ kind }) => kind === 'picture')
  const upright = images.filter(({ name }) => isUpright(at(`sets/${name}.fits`)))
  const { pictures, leftOut } = readPictures(upright.flatMap(({ name }) => pictureFiles(name, at)))
  return reportPage({
    title: record.title,
    summary: `Comparison of the run “${record.run.title}” with data: ${record.sets.map(({ name }) => name).join(', ')}. Chi-squared ${digits(record.all.chiSquared)} for ${digits(record.all.degreesOfFreedom)} degrees of freedom.`,
    warnings: [...record.warnings, ...leftOut],
    pictures: pictures.map((picture) => ({ ...picture, notes: [...picture.notes, offsetNote] })),
    charts: record.sets.map((set) => setSection(set, at, upright.includes(set))),
    tables: [agreementTable(record), valuesTable(record), fittedTable(record)],
    texts: [{ heading: 'Data', name: 'data.yaml', text: readFileSync(at('data.yaml'), 'utf8') }],
    reproduce: {
      commands: [['motelight', 'compare', record.run.folder, record.data].map(shellWord).join(' ')],
      remarks: [`Made with motelight ${record.version} of a run made with ${record.run.version}, seed ${record.run.seed}.`],
      inputs: [...record.inputs, ...record.run.inputs]
    }
  })
}

/** North is up and east to the left, as the pictures of a page have it, to a pixel in a thousand. */
function isUpright(path: string): boolean {
  const matrix = pixelMatrix(readFits(path)[0])
  if (!matrix) return false
  const { perEast, perNorth } = matrix
  return perEast[0] < -1000 * Math.abs(perEast[1]) && perNorth[1] > 1000 * Math.abs(perNorth[0])
}

/** Residuals, and what they are made of: two pictures, since their units differ. */
function pictureFiles(name: string, at: (file: string) => string): PictureFile[] {
  const file = `sets/${name}.fits`
  const from = { path: at(file), file }
  return [
    { ...from, heading: `${name}: residuals`, planes: [{ name: 'RESIDUAL', meaning: '(data − model) / σ' }] },
    {
      ...from,
      heading: `${name}: data and model`,
      planes: [
        { name: 'DATA', meaning: 'data', sigma: 'SIGMA' },
        { name: 'SIGMA', meaning: '1 sigma of the data' },
        { name: 'MODEL', meaning: 'model', sigma: 'MODELSIG' },
        { name: 'MODELSIG', meaning: '1 sigma, Monte Carlo' }
      ]
    }
  ]
}

/** The chart of a table; plots that hold more: the model between its rows, profiles of a picture, residuals of a turned one north up. */
function setSection({ name, kind }: SetFinding, at: (file: string) => string, upright: boolean): ChartSection {
  const table = `sets/${name}.ecsv`
  const plots = plotsOf(kind).filter(({ ending }) => !(upright && ending === '-residual'))
  return {
    heading: kind === 'picture' ? `${name}: profiles` : `${name}: ${kind}`,
    charts: kind === 'picture' ? [] : [readModelChart(at(table), table, 'Data and model')],
    pictures: plots
      .map(({ ending, alt }) => ({ file: at(`sets/${name}${ending}.png`), alt: `${name}: ${alt}` }))
      .filter(({ file }) => existsSync(file))
      .map(({ file, alt }) => ({ alt, base64: readFileSync(file).toString('base64') })),
    tables: []
  }
}

function agreementTable({ sets, all }: ComparisonRecord): TableSection {
  const row = (name: string, { chiSquared, degreesOfFreedom, probability }: Agreement) => [
    name,
    digits(chiSquared),
    digits(degreesOfFreedom),
    probability === null ? '' : digits(probability, 2)
  ]
  return {
    heading: 'Agreement',
    columns: ['', 'chi-squared', 'degrees of freedom', 'larger by chance'],
    rows: [...sets.map((set) => row(set.name, set)), ...(sets.length > 1 ? [row('all', all)] : [])],
    note: 'Larger by chance: the probability of a larger chi-squared, were the model true.'
  }
}

function valuesTable({ sets }: ComparisonRecord): TableSection {
  return {
    heading: 'Values compared',
    columns: ['', 'µm', 'values', 'upper limits', 'independent', 'left out', 'Monte Carlo part of the variance'],
    rows: sets.map(({ name, wavelengthUm, values, limits, independent, leftOut, noiseShare }) => [
      name,
      wavelengthUm === undefined ? '' : digits(wavelengthUm),
      String(values),
      String(limits),
      digits(independent),
      Object.entries(leftOut)
        .filter(([, count]) => count > 0)
        .map(([reason, count]) => `${count} ${reason}`)
        .join(', '),
      `${digits(100 * noiseShare, 2)} %`
    ])
  }
}

function fittedTable({ scalings }: ComparisonRecord): TableSection {
  return {
    heading: 'Fitted',
    columns: ['', 'value', '1 sigma', 'unit', 'of'],
    rows: scalings.map(({ scaling, value, sigma, unit, sets }) => [
      scaling,
      digits(value),
      sigma === null ? 'not told by the data' : digits(sigma, 2),
      unit,
      sets.join(', ')
    ])
  }
}
