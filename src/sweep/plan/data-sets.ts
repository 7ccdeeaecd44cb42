import type { DataFiles } from '../../scene/data-files.js'
import { isRecord } from '../../scene/is-record.js'
import { locateProblem } from '../../scene/issue-problems.js'
import type { YamlDocument } from '../../scene/yaml-document.js'
import { formatQuantity } from '../../units/quantity.js'
import type { DataSet } from '../types.js'
import { parseDataTable } from './data-table.js'
import type { WrittenPlan } from './plan-schema.js'

/**
 * The data sets of a plan, each with a spectrum that every model gets for it: like the one it names, at exactly the wavelengths
 * of the data. Problems go to `files`.
 */
export function readDataSets(
  written: WrittenPlan['data'],
  base: Record<string, unknown>,
  document: YamlDocument,
  files: DataFiles
): { set: DataSet; spectrum: Record<string, unknown> }[] {
  const spectra = Array.isArray(base.spectra) ? base.spectra.filter(isRecord) : []
  return written.flatMap(({ name, file, spectrum }, i) => {
    const report = (key: string, message: string) => files.problems.push(locateProblem(document, ['data', i, key], message))
    const like = spectra.find((candidate) => candidate.name === spectrum)
    const added = `data-${name}`
    const known = spectra.map((candidate) => candidate.name).join(', ')
    if (!like) report('spectrum', `the scene has no such spectrum; there are: ${known || 'none'}`)
    if (spectra.some((candidate) => candidate.name === added) || written.findIndex((other) => other.name === name) < i)
      report('name', 'the name is used twice')
    const table = files.read(file, ['data', i, 'file'], parseDataTable)
    if (!like || !table) return []
    const wavelengths = [...new Set(table.wavelengths)].map((value) => formatQuantity(value, 'wavelength'))
    return [{ set: { name, file, spectrum: added, ...table }, spectrum: { ...like, name: added, wavelengths, unit: 'Jy' } }]
  })
}
