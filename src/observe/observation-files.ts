import type { RunFolder } from '../run/run-folder.js'
import { dataAmong, type Product, writeFolder } from '../run/write-folder.js'
import { type ObservationRecord, observationRecord, observationRecordName } from './observation-record.js'
import { observationReport } from './observation-report.js'
import type { Observed } from './observe-run.js'
import { photometryEcsv, photometryPlot } from './photometry-files.js'
import { pictureFits, picturePng } from './picture-files.js'
import { closureEcsv, curveEcsv, visibilityEcsv, visibilityPlot } from './visibility-files.js'

/** Writes all files of an observation, without pictures, plots and page where `dataOnly`, the record last. Throws OutputError. */
export function writeObservation(observed: Observed, folder: RunFolder, dataOnly = false): Promise<ObservationRecord> {
  const all = productsOf(observed)
  const report = (record: ObservationRecord) => observationReport(folder.path, record)
  return writeFolder(
    folder,
    observationRecordName,
    dataOnly ? dataAmong(all) : all,
    (files) => observationRecord(observed, files),
    dataOnly ? undefined : report
  )
}

function productsOf(observed: Observed): Product[] {
  const { run, instrument, pictures, fluxes, visibilities } = observed
  const { title } = run.record
  const spectra = [...new Set(fluxes.map(({ source }) => source.name))]
  return [
    { file: 'instrument.yaml', make: () => instrument.text },
    ...pictures.flatMap(({ picture, source }) => [
      { file: `pictures/${picture.spec.name}.fits`, make: () => pictureFits(picture, source, title) },
      { file: `pictures/${picture.spec.name}.png`, make: () => picturePng(picture, source, title) }
    ]),
    ...(fluxes.length > 0 ? [{ file: 'photometry.ecsv', make: () => photometryEcsv(observed) }] : []),
    ...spectra.map((name) => ({ file: `photometry-${name}.png`, make: () => photometryPlot(observed, name) })),
    ...visibilities.flatMap(({ measured }) => {
      const path = `visibilities/${measured.spec.name}`
      return [
        { file: `${path}.ecsv`, make: () => visibilityEcsv(measured, title) },
        ...(measured.closures.length > 0 ? [{ file: `${path}-closure.ecsv`, make: () => closureEcsv(measured, title) }] : []),
        { file: `${path}-curve.ecsv`, make: () => curveEcsv(measured, title) },
        { file: `${path}.png`, make: () => visibilityPlot(measured, title) }
      ]
    })
  ]
}
