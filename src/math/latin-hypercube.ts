/**
 * `count` points in the unit cube, one array of `dimensions` numbers each: in every dimension one point in each of `count` equal
 * intervals, at a random place in it, in random order (McKay, Beckman & Conover 1979, Technometrics 21, 239).
 */
export function latinHypercube(count: number, dimensions: number, uniform: () => number): number[][] {
  const columns = Array.from({ length: dimensions }, () =>
    shuffled(count, uniform).map((interval) => (interval + uniform()) / count)
  )
  return Array.from({ length: count }, (_, i) => columns.map((column) => column[i]))
}

/** 0 to count - 1 in random order (Fisher & Yates, in the form of Durstenfeld 1964). */
function shuffled(count: number, uniform: () => number): number[] {
  const order = Array.from({ length: count }, (_, i) => i)
  for (let last = count - 1; last > 0; last--) {
    const other = Math.floor(uniform() * (last + 1))
    ;[order[last], order[other]] = [order[other], order[last]]
  }
  return order
}
