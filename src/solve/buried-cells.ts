import type { Model } from '../model/model.js'
import { forEachWall } from './conduction.js'

/** A cell is buried where its middle lies at least so deep (Rosseland mean), and the middles of all cells about it lie so deep. */
const BURIED = 2
const BURIED_ABOUT = 1

export interface Burial {
  /** Cells whose every wall lies in dust, in their order. */
  buried: number[]
  /**
   * Least optical depth from the middle of every cell, by way of the middles of others, to where there is no dust that conducts; Infinity
   * where no way leads there.
   */
  depth: Float64Array
}

/**
 * Cells so deep in dust that radiation diffuses through all of their walls. `extinction` by cell: the Rosseland mean, cm-1, 0 where
 * nothing conducts. What lies at a surface is not buried, however thick: it shines into the open.
 */
export function buriedCells({ walls, cells }: Pick<Model, 'walls' | 'cells'>, extinction: Float64Array): Burial {
  const depth = new Float64Array(cells).fill(Number.POSITIVE_INFINITY)
  const open = new Uint8Array(cells)
  const queue: number[] = []
  const reach = (cell: number, least: number) => {
    if (least >= depth[cell]) return
    depth[cell] = least
    queue.push(cell)
  }
  for (let cell = 0; cell < cells; cell++) {
    if (!(extinction[cell] > 0)) continue
    forEachWall(walls, cell, (beyond, _, path) => {
      if (beyond >= 0 && extinction[beyond] > 0) return
      open[cell] = 1
      reach(cell, path * extinction[cell])
    })
  }
  for (let next = 0; next < queue.length; next++) {
    const cell = queue[next]
    forEachWall(walls, cell, (beyond, _, path, pathBeyond) => {
      if (beyond >= 0 && extinction[beyond] > 0)
        reach(beyond, depth[cell] + path * extinction[cell] + pathBeyond * extinction[beyond])
    })
  }
  const buried: number[] = []
  for (let cell = 0; cell < cells; cell++) {
    if (!(extinction[cell] > 0) || open[cell] === 1 || depth[cell] < BURIED) continue
    let enclosed = true
    forEachWall(walls, cell, (beyond) => {
      enclosed &&= depth[beyond] >= BURIED_ABOUT
    })
    if (enclosed) buried.push(cell)
  }
  return { buried, depth }
}
