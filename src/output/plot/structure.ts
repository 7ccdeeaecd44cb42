/** Dust in cells: what `structurePlot` draws. Lengths cm, densities g/cm3, temperatures K. */
export type DustStructure = RadialStructure | MeridionalStructure | PlaneStructure

/** Cells that depend on the radius only. */
export interface RadialStructure {
  kind: 'radial'
  /** Radii of the cell centres, increasing. */
  r: Float64Array
  components: RadialComponent[]
}

export interface RadialComponent {
  name: string
  density: Float64Array
  /** Absent for a component that does not emit. */
  temperature?: Float64Array
  /** 1 sigma of the temperature; absent where it is fixed. */
  sigma?: Float64Array
}

/** Cells symmetric about z: cell ir * (number of polar cells) + it lies between `rWalls` ir and ir + 1. */
export interface MeridionalStructure {
  kind: 'map'
  rWalls: Float64Array
  /** Walls in the cosine of the polar angle, either from 1 to -1 or from -1 to 1. */
  cosThetaWalls: Float64Array
  components: MeridionalComponent[]
}

/** Cells of any kind, cut by planes through the origin. */
export interface PlaneStructure {
  kind: 'planes'
  /** Pixels along each side. */
  pixels: number
  components: PlaneComponent[]
}

export interface PlaneComponent extends MeridionalComponent {
  /** Its planes reach from -half to half, cm. */
  half: number
  /** Names of the axes to the right and up; the cell in every pixel, row by row from the top, -1 outside. */
  planes: { axes: [string, string]; cells: Int32Array }[]
}

export interface MeridionalComponent {
  name: string
  density: Float64Array
  /** Absent for a component that does not emit. */
  temperature?: Float64Array
}
