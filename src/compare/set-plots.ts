import type { Agreed } from './compare-run.js'
import { factorOf, placementOf } from './fit.js'
import { residualPng } from './picture-files.js'
import { profilePlot } from './profile-plot.js'
import { rowsPlot } from './rows-files.js'

/** A plot of a data set with its model: what ends its file's name, and what it shows. */
interface SetPlot {
  ending: '' | '-residual' | '-profiles'
  alt: string
}

const ofRows: SetPlot[] = [{ ending: '', alt: 'data, model and residuals over sigma' }]
const ofPictures: SetPlot[] = [
  { ending: '-residual', alt: 'residuals over sigma, north up' },
  { ending: '-profiles', alt: 'means of data and model over rings and sectors, with residuals' }
]

/** The plots that there are of a data set of a kind. */
export function plotsOf(kind: string): SetPlot[] {
  return kind === 'picture' ? ofPictures : ofRows
}

/** Draws a plot (PNG) of one of the sets. */
export async function drawPlot(
  { sets, models, parameters, values }: Agreed,
  index: number,
  { ending }: SetPlot,
  title: string
): Promise<Uint8Array> {
  const [set, model] = [sets[index], models[index]]
  const { shown } = set
  if (shown.kind === 'rows') return rowsPlot(set, shown, model, factorOf(set, parameters, values), title)
  if (ending === '-residual') return residualPng(set, shown, model, title)
  return profilePlot(set, shown, model, placementOf(set, parameters, values), title)
}
