import { escaped } from '../../report/html.js'
import { inScene } from '../plan/value.js'
import type { Outcomes } from '../results/sweep-table.js'
import type { Sweep } from '../types.js'
import { parameterRows } from './parameter-rows.js'
import type { Summary } from './summary.js'
import { dataPlot, pairPlot, parameterPlot } from './summary-plots.js'

/** Pairs drawn; the JSON has all. */
const MOST_PAIRS = 15

/** A page that tells what the data say: one file, nothing from elsewhere, no script. */
export async function summaryPage(sweep: Sweep, outcomes: Outcomes, summary: Summary): Promise<string> {
  const { best, parameters, pairs, warnings, compared, points } = summary
  const plots: string[] = []
  for (const parameter of parameters) plots.push(`<h3>${escaped(parameter.name)}</h3>${await parameterPlot(sweep, parameter)}`)
  const maps: string[] = []
  for (const pair of pairs.slice(0, MOST_PAIRS)) maps.push(await pairPlot(sweep, pair))
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'">
<title>${escaped(summary.title)}</title>
<style>
body { font: 15px/1.5 "DejaVu Sans", sans-serif; max-width: 60em; margin: 2em auto; padding: 0 1em; color: #222; }
table { border-collapse: collapse; } th, td { padding: 0.2em 0.9em; border-bottom: 1px solid #ddd; text-align: right; }
th { text-align: right; font-weight: 600; } td:first-child, th:first-child { text-align: left; }
.warning { background: #fff4e0; border-left: 4px solid #e69f00; padding: 0.4em 0.8em; margin: 0.3em 0; }
svg { max-width: 100%; height: auto; }
</style>
</head>
<body>
<h1>${escaped(summary.title)}</h1>
<p>${compared} of ${sweep.models.length} models compared with ${points} measured fluxes. Errors of data and models are taken to be
Gaussian and independent; probabilities are for flat priors over the ranges of the plan, in the logarithm where it is spaced so.</p>
${warnings.map((warning) => `<p class="warning">${escaped(warning)}</p>`).join('\n')}
<h2>Parameters</h2>
${table([['', 'best model', '68 % by profile', '68 % credible', 'median'], ...parameterRows(sweep, summary)])}
<h2>Best models</h2>
${table([
  ['model', 'chi squared', '−2 ln (L / L best)', ...sweep.parameters.map(({ name }) => name)],
  ...best.map(({ model, chiSquared, deviance, values }) => [
    String(model),
    chiSquared.toPrecision(4),
    deviance.toPrecision(3),
    ...values.map((value, p) => String(inScene(value, sweep.parameters[p].unit)))
  ])
])}
<h2>Model ${best[0].model} and the data</h2>
${await dataPlot(sweep, outcomes, best[0].model)}
<h2>Likelihood of each parameter</h2>
<p>Left the profile: the best that any model reaches with each value; dashed, 68 % and 95 % for one parameter. Right the marginal
probability, with 16 %, 50 % and 84 %.</p>
${plots.join('\n')}
${maps.length > 0 ? `<h2>Pairs</h2>\n${maps.join('\n')}` : ''}
</body>
</html>
`
}

function table([header, ...rows]: string[][]): string {
  const line = (tag: string, cells: string[]) => `<tr>${cells.map((cell) => `<${tag}>${escaped(cell)}</${tag}>`).join('')}</tr>`
  return `<table>\n${[line('th', header), ...rows.map((row) => line('td', row))].join('\n')}\n</table>`
}
