import type { ApertureSpectrum, CameraImages } from '../camera/types.js'
import { isOctree } from '../grid/cells.js'
import type { Model } from '../model/model.js'
import { spectrumPlot } from '../output/plot/spectrum-plot.js'
import type { DustStructure } from '../output/plot/structure.js'
import { structurePlot } from '../output/plot/structure-plot.js'
import { azimuthalPicture } from '../output/png/azimuthal-picture.js'
import { cameraPicture } from '../output/png/camera-picture.js'
import { columnPicture } from '../output/png/column-picture.js'
import { polarisedPicture } from '../output/png/polarised-picture.js'
import { wavelengthLabels } from '../output/wavelength-label.js'
import { isFromPlace } from '../scene/is-from-place.js'
import type { Scene } from '../scene/types.js'
import type { DustTemperatures } from '../solve/dust-temperatures.js'
import { dustStructure } from './dust-cells.js'
import { dustPlanes } from './dust-planes.js'
import type { Shown } from './shown.js'
import type { Product } from './write-folder.js'

/** The files that show something of a run; `edges`: those of the cells, in pictures of the dust. */
export function picturesOf(shown: Shown, scene: Scene, edges: boolean): Product[] {
  if (shown.kind === 'dust') return structurePlots(shown.model, shown.dust, edges)
  if (shown.kind === 'column') return columnPictures(shown.images, scene)
  return shown.kind === 'camera' ? cameraPictures(shown.images, shown.k, scene) : spectrumPlots(shown.result, scene)
}

/** The pictures of a camera at one of its wavelengths. */
function cameraPictures(images: CameraImages, k: number, scene: Scene): Product[] {
  const { name, view, wavelengths } = images.camera
  const path = `images/${name}-${wavelengthLabels(wavelengths)[k]}`
  const picture = { file: `${path}.png`, make: () => cameraPicture(images, k, scene) }
  if (!images.stokes) return [picture]
  const polarised = { file: `${path}-polarised.png`, make: () => polarisedPicture(images, k, scene) }
  // A map of all directions has no centre.
  if (isFromPlace(view) && view.allSky) return [picture, polarised]
  return [
    picture,
    polarised,
    { file: `${path}-q-phi.png`, make: () => azimuthalPicture(images, k, scene, 'q') },
    { file: `${path}-u-phi.png`, make: () => azimuthalPicture(images, k, scene, 'u') }
  ]
}

/** The picture of the dust that a camera looks through. */
function columnPictures(images: CameraImages, scene: Scene): Product[] {
  const { column, camera } = images
  if (!column) return []
  return [{ file: `images/${camera.name}-column.png`, make: () => columnPicture(images, column.density, scene) }]
}

function spectrumPlots(result: ApertureSpectrum, scene: Scene): Product[] {
  const path = `spectra/${result.spectrum.name}`
  let drawn: ReturnType<typeof spectrumPlot> | undefined
  const plot = () => {
    drawn ??= spectrumPlot(result, scene)
    return drawn
  }
  return [
    { file: `${path}.svg`, make: async () => (await plot()).svg },
    { file: `${path}.png`, make: async () => (await plot()).png }
  ]
}

/** Spherical cells as curves or maps, in more than one dimension in two planes as well; cubes in those alone. */
function structurePlots(model: Model, dust: DustTemperatures, edges: boolean): Product[] {
  if (model.components.length === 0) return []
  const plot = (name: string, structure: () => DustStructure) => ({
    file: `dust/${name}.png`,
    make: () => structurePlot(structure(), model.scene.title, edges)
  })
  const planes = () => dustPlanes(model, dust)
  if (isOctree(model.walls)) return [plot('structure', planes)]
  const curvesOrMaps = plot('structure', () => dustStructure(model, dust))
  return model.dimensions === 1 ? [curvesOrMaps] : [curvesOrMaps, plot('planes', planes)]
}
