import type { ShapeSpec } from '../scene/types.js'
import { ball } from './ball.js'
import { disk } from './disk.js'
import type { Shape } from './shape.js'
import { shell } from './shell.js'

/** The shape that a scene describes. */
export function makeShape(spec: ShapeSpec): Shape {
  switch (spec.kind) {
    case 'shell':
      return shell(spec.inner, spec.outer, spec.slope)
    case 'disk':
      return disk(spec)
    case 'ball':
      return ball(spec.radius)
  }
}
