/** Narrower cells would show as nothing but their edges, pixels. */
const NARROW = 3

/** Marks by 1 the pixels of a map, `width` in a row, at which another cell begins to the right or below; not between narrow cells. */
export function cellEdges(cells: Int32Array, width: number): Uint8Array {
  const marked = new Uint8Array(cells.length)
  const height = cells.length / width
  for (let row = 0; row < height; row++) markLine(cells, row * width, 1, width, marked)
  for (let column = 0; column < width; column++) markLine(cells, column, width, height, marked)
  return marked
}

function markLine(cells: Int32Array, start: number, step: number, length: number, marked: Uint8Array): void {
  // What the frame cuts may be wide.
  const breaks = [-NARROW]
  for (let i = 1; i < length; i++) if (cells[start + i * step] !== cells[start + (i - 1) * step]) breaks.push(i)
  breaks.push(length + NARROW)
  for (let k = 1; k + 1 < breaks.length; k++)
    if (Math.min(breaks[k] - breaks[k - 1], breaks[k + 1] - breaks[k]) >= NARROW) marked[start + breaks[k] * step] = 1
}
