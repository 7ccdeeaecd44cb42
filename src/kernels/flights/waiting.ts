/** Parts of a split packet that wait for their turn: where they are, and how many. */
@unmanaged
export class Part {
  s: f64
  b2: f64
  weight: f64
  cell: usize
  count: i32
  /** They fly on straight. */
  straight: bool

  @inline hold(s: f64, b2: f64, weight: f64, cell: usize, count: i32, straight: bool): void {
    this.s = s
    this.b2 = b2
    this.weight = weight
    this.cell = cell
    this.count = count
    this.straight = straight
  }
}
const PART = 40
export const MOST_WAITING = 1024
const waiting = memory.data(MOST_WAITING * PART)

export function waitingPart(i: i32): Part {
  return changetype<Part>(waiting + i * PART)
}
