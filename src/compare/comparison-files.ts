import type { RunFolder } from '../run/run-folder.js'
import { type Product, writeFolder } from '../run/write-folder.js'
import type { Compared } from './compare-run.js'
import { type ComparisonRecord, comparisonRecord, comparisonRecordName } from './comparison-record.js'
import { comparisonReport } from './comparison-report.js'
import { comparedFits } from './picture-files.js'
import { rowsEcsv } from './rows-files.js'
import { drawPlot, plotsOf } from './set-plots.js'

/** Writes all files of a comparison, the record last. Throws OutputError. */
export function writeComparison(compared: Compared, folder: RunFolder): Promise<ComparisonRecord> {
  const report = (record: ComparisonRecord) => comparisonReport(folder.path, record)
  return writeFolder(folder, comparisonRecordName, productsOf(compared), (files) => comparisonRecord(compared, files), report)
}

function productsOf(compared: Compared): Product[] {
  const { run, data, sets, models } = compared
  const { title } = run.record
  return [
    { file: 'data.yaml', make: () => data.text },
    ...sets.flatMap((set, i): Product[] => {
      const { shown, spec } = set
      const table =
        shown.kind === 'rows'
          ? { file: `sets/${spec.name}.ecsv`, make: () => rowsEcsv(set, shown, models[i], title) }
          : { file: `sets/${spec.name}.fits`, make: () => comparedFits(set, shown, models[i], title) }
      const plots = plotsOf(spec.kind).map((plot) => ({
        file: `sets/${spec.name}${plot.ending}.png`,
        make: () => drawPlot(compared, i, plot, title)
      }))
      return [table, ...plots]
    })
  ]
}
