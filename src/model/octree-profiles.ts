import type { DustLayer } from '../grid/dust-layer.js'
import { cellCube, type Octree } from '../grid/octree/octree.js'
import { CUT, cutProfile, STEEPEST, slopeProfile } from '../grid/octree/profile.js'
import { allocateShared } from '../math/allocate.js'
import { gaussPoints, spreadPoints } from './cube-points.js'
import { EdgeCut } from './edge-cut.js'

/** Evenly spread points by which the edge of the dust is found. */
const POINTS = 250
/** Of an even change, over its first moment in sides: 1 over the mean square of a coordinate. */
const MOMENT = 12

/**
 * Finds how the extinction of all dust varies within each cell of an octree: the even change that has its mass and centre of mass, behind
 * a plane where the edge of the dust cuts the cell.
 */
export function fitProfiles(octree: Octree, layers: DustLayer[]): void {
  const { cells, profiles } = octree
  const { places, weights } = gaussPoints()
  const cube = new Float64Array(4)
  const edge = new EdgeCut(spreadPoints(POINTS))
  const cuts: number[] = []
  for (let cell = 0; cell < cells; cell++) {
    const [x, y, z, length] = cellCube(octree, cell, cube)
    const extinctionAt = (points: Float64Array, k: number) => {
      const [px, py, pz] = [x + points[3 * k] * length, y + points[3 * k + 1] * length, z + points[3 * k + 2] * length]
      let chi = 0
      for (const { shape, scale, extinction } of layers) chi += scale * extinction * shape.relativeDensity(px, py, pz)
      return chi
    }
    let [sum, empty] = [0, 0]
    let [mx, my, mz] = [0, 0, 0]
    for (let k = 0; k < weights.length; k++) {
      const value = extinctionAt(places, k)
      const weighed = weights[k] * value
      if (value === 0) empty++
      sum += weighed
      mx += weighed * places[3 * k]
      my += weighed * places[3 * k + 1]
      mz += weighed * places[3 * k + 2]
    }
    if (empty === weights.length) continue
    if (empty > 0 && edge.fit((k) => extinctionAt(edge.points, k))) {
      profiles[cell] = cutProfile(cuts.length / CUT)
      cuts.push(...edge.cut)
      continue
    }
    if (!(sum > 0)) continue
    const together = (MOMENT * (Math.abs(mx) + Math.abs(my) + Math.abs(mz))) / sum
    const scale = MOMENT / sum / Math.max(1, together / STEEPEST)
    profiles[cell] = slopeProfile(scale * mx, scale * my, scale * mz)
  }
  octree.cuts = new Float32Array(allocateShared(4 * cuts.length))
  octree.cuts.set(cuts)
}
