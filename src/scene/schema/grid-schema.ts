import { z } from 'zod'
import type { GridSpec } from '../types.js'
import { count, notYet, section } from './fields.js'
import { quantity } from './quantity-field.js'

const mostCells = 2e7

const auto = section({ kind: z.literal('auto').prefault('auto').describe('The program chooses (default)') }).transform(
  ({ kind }): GridSpec => ({ kind, radial: 0, polar: 0, azimuthal: 0 })
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
  .transform(({ kind, radial = 0, polar = 0, azimuthal = 0 }): GridSpec => ({ kind, radial, polar, azimuthal }))

const octree = section({
  kind: z.literal('octree').describe('Cubes divided where needed'),
  width: quantity('length').optional(),
  finest: count(1, 30).optional().describe('Deepest level'),
  'cells-at-most': count(8, 1e9).optional()
})

/** `grid`. */
export const gridSchema = z.discriminatedUnion('kind', [auto, spherical, notYet(octree, '`kind: octree`', 'kind')])
