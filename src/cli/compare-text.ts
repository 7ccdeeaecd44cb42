import { relative } from 'node:path'
import type { ComparisonRecord } from '../compare/comparison-record.js'
import type { Agreement, ScalingFinding, SetFinding } from '../compare/verdict.js'
import { shown, table, withError } from './words.js'

/** What `compare` says at its end. */
export function compareText(record: ComparisonRecord, folder: string): string {
  const { sets, all, scalings, warnings } = record
  return [
    `${record.title}: ${record.run.title}`,
    ...table([
      ['', 'chi-squared', 'degrees', 'by chance', ''],
      ...sets.map((set) => [set.name, ...cells(set), counts(set)]),
      ...(sets.length > 1 ? [['all', ...cells(all), '']] : [])
    ]),
    ...(scalings.length > 0 ? ['  fitted:', ...table(scalings.map(scalingCells), '    ')] : []),
    ...warnings.map((warning) => `  warning: ${warning}`),
    `Results are in ${relative('.', folder) || '.'}`,
    ''
  ].join('\n')
}

function cells({ chiSquared, degreesOfFreedom, probability }: Agreement): string[] {
  return [shown(chiSquared, 4), shown(degreesOfFreedom, 4), probability === null ? '' : shown(probability, 2)]
}

function counts({ values, limits, independent, leftOut }: SetFinding): string {
  const left = Object.entries(leftOut).filter(([, count]) => count > 0)
  return [
    `${values} values`,
    ...(limits > 0 ? [`${limits} of them upper limits`] : []),
    ...(independent < values ? [`${shown(independent, 3)} independent`] : []),
    ...left.map(([reason, count]) => `${count} ${reason}`)
  ].join(', ')
}

function scalingCells({ scaling, value, sigma, unit, sets }: ScalingFinding): string[] {
  return [scaling, `${sigma === null ? shown(value) : withError(value, sigma)} ${unit}`.trim(), sets.join(', ')]
}
