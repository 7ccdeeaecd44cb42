import { escaped } from '../../report/html.js'
import { reportName } from '../../run/write-folder.js'
import { isPacked } from '../folder/is-packed.js'
import { inScene } from '../plan/value.js'
import type { Sweep } from '../types.js'
import { type BestPlot, bestName } from './best-model.js'
import { parameterRows } from './parameter-rows.js'
import type { Summary } from './summary.js'
import { pairPlot, parameterPlot } from './summary-plots.js'

/** Pairs drawn; the JSON has all. */
const MOST_PAIRS = 15

/** A page that tells what the data say: one file, nothing from elsewhere, no script. */
export async function summaryPage(sweep: Sweep, summary: Summary, bestPlots: BestPlot[]): Promise<string> {
  const { best, parameters, pairs, warnings, compared, points } = summary
  const plots: string[] = []
  for (const parameter of parameters) plots.push(`<h3>${escaped(parameter.name)}</h3>${await parameterPlot(sweep, parameter)}`)
  const maps: string[] = []
  for (const pair of pairs.slice(0, MOST_PAIRS)) maps.push(await pairPlot(sweep, pair))
  return `<!doctype html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; img-src data:">
<title>${escaped(summary.title)}</title>
<style>
:root { color-scheme: light; background: #fff; }
body { font: 15px/1.5 "DejaVu Sans", sans-serif; max-width: 60em; margin: 2em auto; padding: 0 1em; color: #222; }
.wide { overflow-x: auto; }
table { border-collapse: collapse; } th, td { padding: 0.2em 0.9em; border-bottom: 1px solid #ddd; text-align: right; }
th { font-weight: 600; vertical-align: bottom; } td { white-space: nowrap; } td:first-child, th:first-child { text-align: left; }
.warning { background: #fff4e0; border-left: 4px solid #e69f00; padding: 0.4em 0.8em; margin: 0.3em 0; }
.plots { display: grid; grid-template-columns: repeat(auto-fit, minmax(min(24em, 100%), 1fr)); gap: 1.5em; align-items: start; }
svg, img { max-width: 100%; height: auto; }
</style>
</head>
<body>
<h1>${escaped(summary.title)}</h1>
<p>${compared} of ${sweep.models.length} models compared with ${points} measured values. Errors of data and models are taken to be
Gaussian and independent; probabilities are for flat priors over the ranges of the plan, in the logarithm where it is spaced so.</p>
${warnings.map((warning) => `<p class="warning">${escaped(warning)}</p>`).join('\n')}
<h2>Parameters</h2>
${table([['', 'best model', '68 % by profile', '68 % credible', 'median'], ...parameterRows(sweep, summary)])}
<h2>Likelihood of each parameter</h2>
<p>Left the profile: the best that any model reaches with each value; dashed, 68 % and 95 % for one parameter. Right the marginal
probability, with 16 %, 50 % and 84 %.</p>
${plots.join('\n')}
${maps.length > 0 ? `<h2>Pairs</h2>\n<div class="plots">${maps.join('\n')}</div>` : ''}
<h2>Best models</h2>
${table([
  ['model', 'chi-squared', '−2 ln (L / L best)', ...sweep.parameters.map(({ name }) => name)],
  ...best.map(({ model, chiSquared, deviance, values }) => [
    String(model),
    chiSquared.toPrecision(4),
    deviance.toPrecision(3),
    ...values.map((value, p) => String(inScene(value, sweep.parameters[p].unit)))
  ])
])}
<p>Chi-squared of the best is for ${Number(best[0].degreesOfFreedom.toPrecision(4))} degrees of freedom (values that are independent, less what was fitted
for each model), without the parameters of the sweep.</p>
<h2>Model ${best[0].model} and the data</h2>
${bestPart(sweep, bestPlots)}
</body>
</html>
`
}

function bestPart(sweep: Sweep, plots: BestPlot[]): string {
  if (plots.length === 0) return '<p>Of so many models the numbers alone are kept, and no images.</p>'
  const images = plots.map(
    ({ alt, png }) => `<img alt="${escaped(alt)}" src="data:image/png;base64,${Buffer.from(png).toString('base64')}">`
  )
  const more = `<p>Residuals, and data and model value by value: <a href="${bestName}/${reportName}">${bestName}/${reportName}</a></p>`
  return `<div class="plots">${images.join('\n')}</div>\n${isPacked(sweep) ? '' : more}`
}

function table([header, ...rows]: string[][]): string {
  const line = (tag: string, cells: string[]) => `<tr>${cells.map((cell) => `<${tag}>${cell}</${tag}>`).join('')}</tr>`
  return `<div class="wide"><table>\n${[line('th', header.map(breakable)), ...rows.map((row) => line('td', row.map(escaped)))].join('\n')}\n</table></div>`
}

/** A long path may be broken at its dots. */
function breakable(text: string): string {
  return escaped(text).replaceAll('.', '.<wbr>')
}
