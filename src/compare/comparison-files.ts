import type { RunFolder } from '../run/run-folder.js'
import { type Product, writeFolder } from '../run/write-folder.js'
import type { Compared } from './compare-run.js'
import { type ComparisonRecord, comparisonRecord, comparisonRecordName } from './comparison-record.js'
import { comparisonReport } from './comparison-report.js'
import { factorOf, placementOf } from './fit.js'
import { comparedFits, profilePlot, residualPng } from './picture-files.js'
import { rowsEcsv, rowsPlot } from './rows-files.js'

/** Writes all files of a comparison, the record last. Throws OutputError. */
export function writeComparison(compared: Compared, folder: RunFolder): Promise<ComparisonRecord> {
  const report = (record: ComparisonRecord) => comparisonReport(folder.path, record)
  return writeFolder(folder, comparisonRecordName, productsOf(compared), (files) => comparisonRecord(compared, files), report)
}

function productsOf({ run, data, sets, models, parameters, values }: Compared): Product[] {
  const { title } = run.record
  return [
    { file: 'data.yaml', make: () => data.text },
    ...sets.flatMap((set, i): Product[] => {
      const { shown, spec } = set
      if (shown.kind === 'rows')
        return [
          { file: `sets/${spec.name}.ecsv`, make: () => rowsEcsv(set, shown, models[i], title) },
          { file: `sets/${spec.name}.png`, make: () => rowsPlot(set, shown, models[i], factorOf(set, parameters, values), title) }
        ]
      const placement = placementOf(set, parameters, values)
      return [
        { file: `sets/${spec.name}.fits`, make: () => comparedFits(set, shown, models[i], title) },
        { file: `sets/${spec.name}-residual.png`, make: () => residualPng(set, shown, models[i], title) },
        { file: `sets/${spec.name}-profiles.png`, make: () => profilePlot(set, shown, models[i], placement, title) }
      ]
    })
  ]
}
