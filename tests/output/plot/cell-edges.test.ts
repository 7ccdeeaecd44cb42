import { expect, it } from 'vitest'
import { cellEdges } from '../../../src/output/plot/cell-edges.js'

it('marks where cells meet to the right and below, but not between narrow ones', () => {
  const rows = ['aaaabbbb', 'aaaabbbb', 'aaaacdcd', 'eeeecdcd', 'eeeecdcd', 'eeeecdcd']
  const cells = Int32Array.from(rows.join(''), (letter) => letter.charCodeAt(0))
  const marked = cellEdges(cells, 8)
  const drawn = rows.map((_, row) => Array.from(marked.subarray(8 * row, 8 * row + 8), (mark) => '.#'[mark]).join(''))
  expect(drawn).toEqual(['....#...', '....#...', '....####', '####....', '........', '........'])
})
