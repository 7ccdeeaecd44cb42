import type { DataFiles } from '../../scene/data-files.js'
import { parseDesignTable } from './design-table.js'
import type { PlanDesk, Varied } from './planned.js'
import { resolvePath } from './scene-path.js'

/** The models of a table of the user's; undefined when a problem was reported. */
export function modelsOfTable(file: string, files: DataFiles, { base, report }: PlanDesk): Varied | undefined {
  let name = file
  const table = files.read(file, ['design', 'table'], (text, _, shownAs) => {
    name = shownAs
    return parseDesignTable(text, shownAs)
  })
  if (!table) return undefined
  const parameters = table.columns.map(({ path: written, unit }) => {
    const path = resolvePath(written, base)
    if (!('problem' in path)) return { name: written, path, unit, role: 'varied', kind: 'number', log: false } as const
    report(['design', 'table'], `${name}, column ${written}: ${path.problem}`)
    return undefined
  })
  return {
    parameters: parameters.filter((parameter) => parameter !== undefined),
    models: table.rows,
    locate: (_, model) => ({ file: name, line: table.lines[model - 1], column: 1 })
  }
}
