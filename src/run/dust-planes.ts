import { type Cells, isOctree, openWalk, reachOf } from '../grid/cells.js'
import type { Model } from '../model/model.js'
import type { PlaneStructure } from '../output/plot/structure.js'
import type { DustTemperatures } from '../solve/dust-temperatures.js'
import { shownParts } from './dust-cells.js'

/** Pixels along each side of a plane. */
const PIXELS = 360

/** The cells in the planes x-z and x-y through the origin, each component as far as it reaches. */
export function dustPlanes(model: Model, dust: DustTemperatures): PlaneStructure {
  const { walls, components } = model
  const most = isOctree(walls) ? 0.5 * walls.side : reachOf(walls)
  return {
    kind: 'planes',
    pixels: PIXELS,
    components: shownParts(model, dust).map((part, c) => {
      const half = Math.min(most, components[c].shape.outerRadius)
      return { ...part, half, planes: [cut(walls, half, 'xz'), cut(walls, half, 'xy')] }
    })
  }
}

/** The cell in every pixel of a plane, row by row from the top; -1 outside. */
function cut(walls: Cells, half: number, axes: 'xz' | 'xy'): PlaneStructure['components'][number]['planes'][number] {
  const walk = openWalk(walls)
  const reach = isOctree(walls) ? Number.POSITIVE_INFINITY : reachOf(walls)
  const at = (k: number) => half * ((2 * (k + 0.5)) / PIXELS - 1)
  const cells = new Int32Array(PIXELS * PIXELS).fill(-1)
  for (let row = 0; row < PIXELS; row++) {
    for (let column = 0; column < PIXELS; column++) {
      const [across, up] = [at(column), -at(row)]
      if (Math.hypot(across, up) >= reach) continue
      if (axes === 'xz') walk.startAt(across, 0, up, 0, 0, 1)
      else walk.startAt(across, up, 0, 0, 0, 1)
      cells[row * PIXELS + column] = walk.cell
    }
  }
  return { axes: [axes[0], axes[1]], cells }
}
