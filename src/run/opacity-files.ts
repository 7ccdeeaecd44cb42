import { join } from 'node:path'
import { type EcsvColumn, ecsv } from '../output/ecsv.js'
import { fractionAxis, linePlot, opacityAxis, type PlotLine } from '../output/plot/line-plot.js'
import { linearAxis } from '../output/plot/linear-axis.js'
import { logAxis } from '../output/plot/log-axis.js'
import { version } from '../output/version.js'
import { wavelengthLabel } from '../output/wavelength-label.js'
import type { OpacityReport, ScatteringReport } from './opacity-report.js'
import { writeOutput } from './output-error.js'

/** Plots leave out wavelengths beyond these, um: opacities are power laws there. */
const SHOWN_UM: [number, number] = [0.05, 1e4]
const MOST_DECADES = 6

/**
 * Writes tables (ECSV) and plots (SVG, PNG) of a report into a folder: `NAME` against wavelength, `NAME-scattering` against angle,
 * `NAME-means` against temperature. Returns the names of the files. Throws OutputError.
 */
export async function writeOpacityFiles(report: OpacityReport, folder: string): Promise<string[]> {
  const { name } = report
  const [curves, scattering, means] = await Promise.all([curvesPlot(report), scatteringPlot(report), meansPlot(report)])
  const files: [string, string | Uint8Array][] = [
    [`${name}.ecsv`, curvesTable(report)],
    [`${name}.svg`, curves.svg],
    [`${name}.png`, curves.png],
    ...(report.scattering.length > 0
      ? ([
          [`${name}-scattering.ecsv`, scatteringTable(report)],
          [`${name}-scattering.svg`, scattering.svg],
          [`${name}-scattering.png`, scattering.png]
        ] as [string, string | Uint8Array][])
      : []),
    [`${name}-means.ecsv`, meansTable(report)],
    [`${name}-means.svg`, means.svg],
    [`${name}-means.png`, means.png]
  ]
  for (const [file, data] of files) await writeOutput(join(folder, file), data)
  return files.map(([file]) => file)
}

const meta = ({ name, law, phase }: OpacityReport) => ({
  origin: `motelight ${version}`,
  opacity: name,
  law,
  phase
})

function curvesTable(report: OpacityReport): string {
  const { wavelengthUm, absorption, scattering, extinction, albedo, asymmetry } = report.curves
  const opacity = (name: string, values: Float64Array): EcsvColumn => ({
    name,
    unit: 'cm2 g-1',
    description: 'per gram of dust',
    values
  })
  return ecsv(
    [
      { name: 'wavelength', unit: 'um', description: 'vacuum wavelength', values: wavelengthUm },
      opacity('absorption', absorption),
      opacity('scattering', scattering),
      opacity('extinction', extinction),
      { name: 'albedo', description: 'scattering over extinction', values: albedo },
      { name: 'asymmetry', description: 'mean cosine of the scattering angle', values: asymmetry }
    ],
    meta(report)
  )
}

function scatteringTable(report: OpacityReport): string {
  const { scattering } = report
  const joined = (of: (at: ScatteringReport) => ArrayLike<number>) => scattering.flatMap((at) => Array.from(of(at)))
  const element = (name: 's11' | 's12' | 's33' | 's34'): EcsvColumn => ({
    name,
    unit: 'sr-1',
    description: 'scattering matrix, signs of Bohren & Huffman (1983)',
    values: joined(({ matrix }) => matrix![name])
  })
  return ecsv(
    [
      { name: 'wavelength', unit: 'um', values: joined(({ wavelengthUm, angleDeg }) => angleDeg.map(() => wavelengthUm)) },
      { name: 'angle', unit: 'deg', description: 'scattering angle', values: joined(({ angleDeg }) => angleDeg) },
      {
        name: 'law',
        unit: 'sr-1',
        description: 'scattering law of a run, 1 over all directions',
        values: joined(({ law }) => law)
      },
      ...(scattering[0].matrix
        ? [
            element('s11'),
            element('s12'),
            element('s33'),
            element('s34'),
            { name: 'polarisation', description: '-s12/s11', values: joined(({ polarisation }) => polarisation!) }
          ]
        : [])
    ],
    meta(report)
  )
}

function meansTable(report: OpacityReport): string {
  const { temperatureK, planck, rosseland } = report.means
  return ecsv(
    [
      { name: 'temperature', unit: 'K', values: temperatureK },
      { name: 'planck', unit: 'cm2 g-1', description: 'Planck mean of the absorption', values: planck },
      {
        name: 'rosseland',
        unit: 'cm2 g-1',
        description: 'Rosseland mean of absorption + (1 - asymmetry) scattering',
        values: rosseland
      }
    ],
    meta(report)
  )
}

function curvesPlot({ name, curves }: OpacityReport) {
  const { wavelengthUm: x, absorption, scattering, extinction, albedo, asymmetry } = curves
  const axis = logAxis('wavelength (µm)', SHOWN_UM)
  const opacities: PlotLine[] = [
    { name: 'absorption', x, y: absorption },
    { name: 'scattering', x, y: scattering },
    { name: 'extinction', x, y: extinction, dashed: true }
  ]
  const shares: PlotLine[] = [
    { name: 'albedo', x, y: albedo },
    { name: 'asymmetry', x, y: asymmetry }
  ]
  return linePlot(`Opacity ${name}`, 'per gram of dust', [
    { x: axis, y: opacityAxis(opacities), lines: opacities, height: 320 },
    { x: axis, y: fractionAxis('albedo, asymmetry', shares), lines: shares, height: 160 }
  ])
}

function scatteringPlot({ name, law, phase, scattering }: OpacityReport) {
  const x = linearAxis('scattering angle (°)', [0, 180], 9)
  const label = ({ wavelengthUm }: ScatteringReport) =>
    wavelengthLabel(wavelengthUm / 1e4)
      .replace(/(?=[a-z])/, ' ')
      .replace('um', 'µm')
  const used = scattering.map((at): PlotLine => ({ name: label(at), x: at.angleDeg, y: at.law }))
  const exact = scattering.flatMap((at): PlotLine[] => (at.matrix ? [{ name: label(at), x: at.angleDeg, y: at.matrix.s11 }] : []))
  const polarised = scattering.flatMap((at): PlotLine[] =>
    at.polarisation ? [{ name: label(at), x: at.angleDeg, y: at.polarisation }] : []
  )
  const simpler = law === 'grains' && phase !== 'computed'
  const lines = [...(simpler ? exact : []), ...used.map((line) => ({ ...line, dashed: simpler }))]
  const values = lines.flatMap(({ y }) => Array.from(y))
  const subtitle = simpler ? `full: Mie theory; dashed: the law of a run, ${phase}` : `scattering law: ${phase}`
  return linePlot(`Scattering by ${name}`, subtitle, [
    { x, y: logAxis('probability (1/sr)', values, MOST_DECADES), lines, height: 300 },
    ...(polarised.length > 0
      ? [{ x, y: linearAxis('polarisation −S₁₂/S₁₁', polarisedRange(polarised)), lines: polarised, height: 180 }]
      : [])
  ])
}

function polarisedRange(lines: PlotLine[]): [number, number] {
  const values = lines.flatMap(({ y }) => Array.from(y))
  const [low, high] = [Math.min(0, ...values), Math.max(0.1, ...values)]
  const room = 0.05 * (high - low)
  return [low - room, high + room]
}

function meansPlot({ name, means: { temperatureK: x, planck, rosseland } }: OpacityReport) {
  const lines: PlotLine[] = [
    { name: 'Planck', x, y: planck },
    { name: 'Rosseland', x, y: rosseland }
  ]
  return linePlot(`Mean opacities of ${name}`, 'Planck: absorption; Rosseland: absorption + (1 − asymmetry) scattering', [
    { x: logAxis('temperature (K)', Array.from(x)), y: opacityAxis(lines), lines, height: 340 }
  ])
}
