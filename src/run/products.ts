import { cameraFits } from '../output/fits/camera-fits.js'
import { cellsFits } from '../output/fits/cells-fits.js'
import { spectrumEcsv } from '../output/spectrum-ecsv.js'
import { sceneYaml } from '../scene/write.js'
import { ambientIntensity } from '../solve/scatter-medium.js'
import { LIGHT_SPEED } from '../units/constants.js'
import { cellColumns } from './dust-cells.js'
import { picturesOf } from './pictures.js'
import { type RunFolder, recordName } from './run-folder.js'
import { type RunMaking, type RunRecord, runRecord } from './run-record.js'
import { runReport } from './run-report.js'
import type { RunResult } from './run-result.js'
import type { Shown } from './shown.js'
import { stopwatch } from './stopwatch.js'
import { warningsOf } from './warnings-of.js'
import { type Product, writeFolder } from './write-folder.js'

/** Writes all files of a run, the record last; `drawn`: contents of pictures that are drawn already. Throws OutputError. */
export async function writeProducts(
  result: RunResult,
  folder: RunFolder,
  making: RunMaking,
  drawn: ReadonlyMap<string, string | Uint8Array> = new Map()
): Promise<RunRecord> {
  const time = stopwatch()
  const warnings = warningsOf(result)
  const { scene } = result.model
  const pictures = allShown(result)
    .flatMap((shown) => picturesOf(shown, scene, making.cellEdges ?? false))
    .map(({ file, make }) => ({ file, make: () => drawn.get(file) ?? make() }))
  const products = [...dataOf(result), ...(making.dataOnly ? [] : pictures)]
  const record = (files: string[]) => runRecord(result, making, warnings, { files, time: time() })
  const report = (finished: RunRecord) => runReport(folder.path, finished)
  return writeFolder(folder, recordName, products, record, making.dataOnly ? undefined : report)
}

function dataOf({ model, dust, images, spectra }: RunResult): Product[] {
  const { scene } = model
  const ambient = (wavelength: number) => ambientIntensity(model, LIGHT_SPEED / wavelength)
  return [
    { file: 'scene.yaml', make: () => sceneYaml(scene) },
    ...images.map((result) => ({
      file: `images/${result.camera.name}.fits`,
      make: () => cameraFits(result, scene, result.camera.wavelengths.map(ambient))
    })),
    ...spectra.map((result) => ({ file: `spectra/${result.spectrum.name}.ecsv`, make: () => spectrumEcsv(result, scene) })),
    ...(model.components.length > 0 ? [{ file: 'dust/cells.fits', make: () => cellsFits(cellColumns(model, dust), scene) }] : [])
  ]
}

function allShown({ model, dust, images, spectra }: RunResult): Shown[] {
  return [
    ...images.flatMap((each): Shown[] => [
      { kind: 'column', images: each },
      ...each.camera.wavelengths.map((_, k): Shown => ({ kind: 'camera', images: each, k }))
    ]),
    ...spectra.map((result): Shown => ({ kind: 'spectrum', result })),
    { kind: 'dust', model, dust }
  ]
}
