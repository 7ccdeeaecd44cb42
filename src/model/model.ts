import type { OpacityLaw } from '../dust/opacity-law.js'
import type { Cells } from '../grid/cells.js'
import type { Rims } from '../grid/rims.js'
import type { AmbientSpec, DustSpec, Scene, StarSpec } from '../scene/types.js'
import type { Shape } from '../shapes/shape.js'
import type { AmbientField } from '../sources/ambient.js'
import type { StarSpectrum } from '../sources/star.js'

/** A scene turned into cells: everything that transport needs and that does not change during a run. */
export interface Model {
  scene: Scene
  dimensions: 1 | 2 | 3
  /** Why these cells, in a sentence. */
  reason: string
  walls: Cells
  cells: number
  /** Vertical rims in which all dust ends, through spherical cells. */
  rims?: Rims
  /** cm3 */
  volume: Float64Array
  components: DustComponent[]
  stars: { spec: StarSpec; spectrum: StarSpectrum }[]
  /** Light from outside the dust. */
  fields: { spec: AmbientSpec; spectrum: AmbientField }[]
  /** What the user should know before trusting the result. */
  warnings: string[]
}

export interface DustComponent {
  spec: DustSpec
  law: OpacityLaw
  shape: Shape
  /** g/cm3 for a relative density of 1 in the shape. */
  scale: number
  /** g */
  mass: number
  /** What `amount` stands for, g: the mass with all that has sublimated. */
  massBefore: number
  /** g/cm3, one value a cell. */
  density: Float64Array
}
