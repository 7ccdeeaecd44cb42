import { cellCount, cellVolumes, type SphericalWalls } from '../grid/geometry.js'
import type { Shape } from '../shapes/shape.js'
import { cellMean } from './cell-mean.js'
import { sampledMean } from './sampled-mean.js'

export interface CellDensities {
  /** Mean mass density of every cell, g/cm3. */
  density: Float64Array
  /** Mass found in the cells before any correction, divided by the mass of the shape. */
  massRatio: number
}

/** Deviations of the mass up to this are corrected by scaling all cells. */
const CORRECTED = 0.02

/**
 * Mean density of a component in every cell. `scale` is g/cm3 for a relative density of 1. When the mass in the cells
 * differs from the mass of the shape by less than 2 % the densities are scaled to make it exact; otherwise they are left
 * as they are and `massRatio` tells.
 */
export function cellDensities(walls: SphericalWalls, shape: Shape, scale: number): CellDensities {
  const { r, cosTheta, phi } = walls
  const nt = cosTheta.length - 1
  const np = phi.length - 1
  const volume = cellVolumes(walls, new Float64Array(cellCount(walls)))
  const density = new Float64Array(volume.length)
  if (shape.symmetry === 'none') sampleCells(walls, shape, density)
  else {
    density[0] = cellMean(shape, 0, r[1], -1, 1)
    let cell = 1
    for (let ir = 1; ir < r.length - 1; ir++) {
      for (let it = 0; it < nt; it++) {
        density.fill(cellMean(shape, r[ir], r[ir + 1], cosTheta[it + 1], cosTheta[it]), cell, cell + np)
        cell += np
      }
    }
  }
  return settleMass(density, volume, shape, scale)
}

/** Turns mean relative densities into g/cm3, in place, with the mass made exact where it is nearly so. */
export function settleMass(density: Float64Array, volume: Float64Array, shape: Shape, scale: number): CellDensities {
  let mass = 0
  for (let i = 0; i < density.length; i++) mass += density[i] * volume[i]
  const massRatio = mass / shape.totalMass
  const factor = Math.abs(massRatio - 1) < CORRECTED ? scale / massRatio : scale
  for (let i = 0; i < density.length; i++) density[i] *= factor
  return { density, massRatio }
}

function sampleCells({ r, cosTheta, phi }: SphericalWalls, shape: Shape, density: Float64Array): void {
  density[0] = sampledMean(shape, { r: [0, r[1]], cosTheta: [-1, 1], phi: [0, 2 * Math.PI] })
  let cell = 1
  for (let ir = 1; ir < r.length - 1; ir++) {
    for (let it = 0; it < cosTheta.length - 1; it++) {
      for (let ip = 0; ip < phi.length - 1; ip++) {
        density[cell++] = sampledMean(shape, {
          r: [r[ir], r[ir + 1]],
          cosTheta: [cosTheta[it + 1], cosTheta[it]],
          phi: [phi[ip], phi[ip + 1]]
        })
      }
    }
  }
}
