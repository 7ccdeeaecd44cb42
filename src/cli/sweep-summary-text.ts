import { parameterRows } from '../sweep/meaning/parameter-rows.js'
import type { Summary } from '../sweep/meaning/summary.js'
import { inScene } from '../sweep/plan/value.js'
import type { Sweep } from '../sweep/types.js'
import { shown, table } from './words.js'

/** What `--summary` says. */
export function summaryText(sweep: Sweep, summary: Summary, path: string): string {
  const { title, compared, points, best, warnings } = summary
  return [
    `${title}: ${compared} of ${sweep.models.length} models compared with ${points} measured values`,
    '',
    ...table([['parameter', 'best model', '68 % by profile', '68 % credible', 'median'], ...parameterRows(sweep, summary)]),
    '',
    ...table([
      ['model', 'chi-squared', '-2 ln (L / L best)', ...sweep.parameters.map(({ name }) => name)],
      ...best.map(({ model, chiSquared, deviance, values }) => [
        String(model),
        shown(chiSquared, 4),
        shown(deviance),
        ...values.map((value, p) => String(inScene(value, sweep.parameters[p].unit)))
      ])
    ]),
    '',
    ...warnings.map((warning) => `  warning: ${warning}`),
    `A page with plots is in ${path}/summary.html`,
    ''
  ].join('\n')
}
