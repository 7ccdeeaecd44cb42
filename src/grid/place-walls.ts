import { type DustLayer, upperRanges } from './dust-layer.js'
import type { SphericalWalls } from './geometry.js'
import { polarWalls } from './polar-walls.js'
import { radialWalls } from './radial-walls.js'

export interface WallRequest {
  /** At least one. */
  layers: DustLayer[]
  dimensions: 1 | 2 | 3
  /** Numbers of cells, `radial` with the core; 0 where the program chooses. */
  radial: number
  polar: number
  azimuthal: number
}

const AZIMUTHAL = 32

/** Walls of spherical cells fitted to the dust: see `radialWalls` and `polarWalls`; azimuths are equal. */
export function placeWalls({ layers, dimensions, radial, polar, azimuthal }: WallRequest): SphericalWalls {
  const shapes = layers.map(({ shape }) => shape)
  const cosTheta = dimensions === 1 ? Float64Array.of(1, -1) : polarWalls(shapes, polar)
  const sectors = dimensions < 3 ? 1 : azimuthal > 0 ? azimuthal : AZIMUTHAL
  return {
    r: radialWalls(layers, upperRanges(layers, cosTheta), radial),
    cosTheta,
    phi: Float64Array.from({ length: sectors + 1 }, (_, k) => (2 * Math.PI * k) / sectors)
  }
}
