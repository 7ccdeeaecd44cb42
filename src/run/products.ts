import { isOctree } from '../grid/cells.js'
import type { Model } from '../model/model.js'
import { cameraFits } from '../output/fits/camera-fits.js'
import { cellsFits } from '../output/fits/cells-fits.js'
import { spectrumPlot } from '../output/plot/spectrum-plot.js'
import type { DustStructure } from '../output/plot/structure.js'
import { structurePlot } from '../output/plot/structure-plot.js'
import { azimuthalPicture } from '../output/png/azimuthal-picture.js'
import { cameraPicture } from '../output/png/camera-picture.js'
import { columnPicture } from '../output/png/column-picture.js'
import { polarisedPicture } from '../output/png/polarised-picture.js'
import { spectrumEcsv } from '../output/spectrum-ecsv.js'
import { wavelengthLabels } from '../output/wavelength-label.js'
import { sceneYaml } from '../scene/write.js'
import type { DustTemperatures } from '../solve/dust-temperatures.js'
import { ambientIntensity } from '../solve/scatter-medium.js'
import { LIGHT_SPEED } from '../units/constants.js'
import { cellColumns, dustStructure } from './dust-cells.js'
import { dustPlanes } from './dust-planes.js'
import { type RunFolder, recordName } from './run-folder.js'
import { type RunMaking, type RunRecord, runRecord } from './run-record.js'
import { runReport } from './run-report.js'
import type { RunResult } from './run-result.js'
import { stopwatch } from './stopwatch.js'
import { warningsOf } from './warnings-of.js'
import { dataAmong, type Product, writeFolder } from './write-folder.js'

/** Writes all files of a run, the record last. Throws OutputError. */
export async function writeProducts(result: RunResult, folder: RunFolder, making: RunMaking): Promise<RunRecord> {
  const time = stopwatch()
  const warnings = warningsOf(result)
  const all = productsOf(result, making.cellEdges ?? false)
  const products = making.dataOnly ? dataAmong(all) : all
  const record = (files: string[]) => runRecord(result, making, warnings, { files, time: time() })
  const report = (finished: RunRecord) => runReport(folder.path, finished)
  return writeFolder(folder, recordName, products, record, making.dataOnly ? undefined : report)
}

function productsOf({ model, dust, images, spectra }: RunResult, edges: boolean): Product[] {
  const { scene } = model
  return [
    { file: 'scene.yaml', make: () => sceneYaml(scene) },
    ...images.flatMap((result) => {
      const { name, wavelengths } = result.camera
      return [
        {
          file: `images/${name}.fits`,
          make: () =>
            cameraFits(
              result,
              scene,
              wavelengths.map((wavelength) => ambientIntensity(model, LIGHT_SPEED / wavelength))
            )
        },
        ...(result.column
          ? [{ file: `images/${name}-column.png`, make: () => columnPicture(result, result.column!.density, scene) }]
          : []),
        ...wavelengthLabels(wavelengths).flatMap((label, k) => {
          const path = `images/${name}-${label}`
          const picture = { file: `${path}.png`, make: () => cameraPicture(result, k, scene) }
          if (!result.stokes) return [picture]
          return [
            picture,
            { file: `${path}-polarised.png`, make: () => polarisedPicture(result, k, scene) },
            { file: `${path}-q-phi.png`, make: () => azimuthalPicture(result, k, scene, 'q') },
            { file: `${path}-u-phi.png`, make: () => azimuthalPicture(result, k, scene, 'u') }
          ]
        })
      ]
    }),
    ...spectra.flatMap((result) => {
      const path = `spectra/${result.spectrum.name}`
      let drawn: ReturnType<typeof spectrumPlot> | undefined
      const plot = () => {
        drawn ??= spectrumPlot(result, scene)
        return drawn
      }
      return [
        { file: `${path}.ecsv`, make: () => spectrumEcsv(result, scene) },
        { file: `${path}.svg`, make: async () => (await plot()).svg },
        { file: `${path}.png`, make: async () => (await plot()).png }
      ]
    }),
    ...(model.components.length > 0
      ? [
          { file: 'dust/cells.fits', make: () => cellsFits(cellColumns(model, dust), scene) },
          ...structurePlots(model, dust, edges)
        ]
      : [])
  ]
}

/** Spherical cells as curves or maps, in more than one dimension in two planes as well; cubes in those alone. */
function structurePlots(model: Model, dust: DustTemperatures, edges: boolean): Product[] {
  const plot = (name: string, structure: () => DustStructure) => ({
    file: `dust/${name}.png`,
    make: () => structurePlot(structure(), model.scene.title, edges)
  })
  const planes = () => dustPlanes(model, dust)
  if (isOctree(model.walls)) return [plot('structure', planes)]
  const curvesOrMaps = plot('structure', () => dustStructure(model, dust))
  return model.dimensions === 1 ? [curvesOrMaps] : [curvesOrMaps, plot('planes', planes)]
}
