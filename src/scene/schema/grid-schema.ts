import { z } from 'zod'
import type { GridSpec } from '../types.js'
import { count, section } from './fields.js'
import { quantity } from './quantity-field.js'

const mostCells = 2e7

/** Where the program chooses. */
const spheres = { radial: 0, polar: 0, azimuthal: 0 }
const cubes = { width: 0, finest: 12, cellsAtMost: 300_000 }

const auto = section({ kind: z.literal('auto').prefault('auto').describe('The program chooses (default)') }).transform(
  ({ kind }): GridSpec => ({ kind, ...spheres, ...cubes })
)

const spherical = section({
  kind: z.literal('spherical').describe('Spherical cells'),
  radial: count(1, 10000).optional().describe('Number of cells in radius'),
  polar: count(1, 10000).optional().describe('Number of cells in polar angle'),
  azimuthal: count(1, 10000).optional().describe('Number of cells in azimuth')
})
  .refine(({ radial = 1, polar = 1, azimuthal = 1 }) => radial * polar * azimuthal <= mostCells, {
    error: () => `too many cells; at most ${mostCells} in all`
  })
  .transform(({ kind, radial = 0, polar = 0, azimuthal = 0 }): GridSpec => ({ kind, radial, polar, azimuthal, ...cubes }))

const octree = section({
  kind: z.literal('octree').describe('Cubes divided where needed'),
  width: quantity('length')
    .optional()
    .describe('Side of the whole cube about the origin; default as the dust and the stars need'),
  finest: count(1, 20).prefault(cubes.finest).describe(`Most divisions of the whole cube in two, default ${cubes.finest}`),
  'cells-at-most': count(8, mostCells)
    .prefault(cubes.cellsAtMost)
    .describe(`Most cells; they go where they matter most, default ${cubes.cellsAtMost}`)
}).transform(
  ({ kind, width = 0, finest, 'cells-at-most': cellsAtMost }): GridSpec => ({ kind, ...spheres, width, finest, cellsAtMost })
)

/** `grid`. */
export const gridSchema = z.discriminatedUnion('kind', [auto, spherical, octree])
