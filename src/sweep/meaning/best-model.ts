import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { stringify } from 'yaml'
import { compareModel } from '../../compare/compare-run.js'
import { writeComparison } from '../../compare/comparison-files.js'
import { comparisonRecordName } from '../../compare/comparison-record.js'
import { drawPlot, plotsOf } from '../../compare/set-plots.js'
import { openRun } from '../../observe/run-source.js'
import { openRunFolder } from '../../run/run-folder.js'
import { lightOfResult } from '../data/model-lights.js'
import { dataOf } from '../data/sources.js'
import { isPacked } from '../folder/is-packed.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import type { Outcomes } from '../results/outcomes.js'

/** A plot of the best model with the data of a set. */
export interface BestPlot {
  alt: string
  png: Uint8Array
}

/** The folder in that of a sweep where the best model is compared with the data in full. */
export const bestName = 'best'

/**
 * Compares the best model with the data in full, in a folder of its own where the model has one. Its plots: none where images are needed
 * and the rows of models alone are kept. Throws OutputError.
 */
export async function compareBest(folder: SweepFolder, { results }: Outcomes, model: number): Promise<BestPlot[]> {
  const { sweep, path } = folder
  const data = sweep.data!
  const list = dataOf(data)
  const plots = list.sets.flatMap(({ name, kind }, set) => plotsOf(kind).map((plot) => ({ set, name, plot })))
  const drawn = (draw: (one: (typeof plots)[number]) => Promise<Uint8Array> | Uint8Array) =>
    Promise.all(plots.map(async (one) => ({ alt: `${one.name}: ${one.plot.alt}`, png: await draw(one) })))
  if (isPacked(sweep)) {
    if (data.needsImages) return []
    const agreed = compareModel(lightOfResult(results.get(model)!), list)
    return drawn(({ set, plot }) => drawPlot(agreed, set, plot, `Model ${model}`))
  }
  const run = openRun(folder.model(model))
  const measurements = { ...list, file: data.file, text: stringify(data.content), title: `${sweep.title}: model ${model}` }
  const out = await openRunFolder(join(path, bestName), 'replace', list.inputs, comparisonRecordName)
  await writeComparison({ run, data: measurements, ...compareModel(run, list) }, out)
  return drawn(({ name, plot }) => readFileSync(join(out.path, `sets/${name}${plot.ending}.png`)))
}
