import type { DustSpec, ShapeSpec } from '../scene/types.js'
import { ball } from './ball.js'
import { carve, type GapKind } from './carve.js'
import { clumps } from './clumps.js'
import { cubeField } from './cube-field.js'
import { disk } from './disk.js'
import { infall } from './infall.js'
import { placed } from './placed.js'
import { pointField } from './point-field.js'
import { ring } from './ring.js'
import type { Shape } from './shape.js'
import { shell } from './shell.js'
import { slab } from './slab.js'

/** The shape that a scene describes, carved and clumped in its own frame, then tipped and moved. */
export function makeShape(spec: ShapeSpec, { carve: cuts, clumps: clumped }: Pick<DustSpec, 'carve' | 'clumps'> = {}): Shape {
  let shape = plainShape(spec)
  if (cuts) shape = carve(shape, cuts, gapKinds[spec.kind])
  if (clumped) shape = clumps(shape, clumped)
  return placed(shape, spec.tilt, 'at' in spec ? spec.at : undefined)
}

/** The shape as its kind and its lengths alone make it, about the origin. */
export function plainShape(spec: ShapeSpec): Shape {
  switch (spec.kind) {
    case 'shell':
      return shell(spec.inner, spec.outer, spec.slope)
    case 'disk':
      return disk(spec)
    case 'ring':
      return ring(spec)
    case 'infall':
      return infall(spec)
    case 'ball':
      return ball(spec.radius)
    case 'slab':
      return slab(spec.thickness, spec.width)
    case 'field':
      return spec.data.kind === 'cube' ? cubeField(spec.data, spec.width) : pointField(spec.data, spec.width)
  }
}

const gapKinds: Record<ShapeSpec['kind'], GapKind> = {
  shell: 'spheres',
  ball: 'spheres',
  infall: 'spheres',
  disk: 'cylinders',
  ring: 'cylinders',
  slab: 'cylinders',
  field: 'cylinders'
}
