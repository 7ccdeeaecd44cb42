import { CELLS, TALLY } from './medium'

/** `flightLookup` of transport/scatter-medium.ts: 4096 steps of the signed square of the cosine, and its end. */
export const BIN_OF_FLIGHT = memory.data(4096 + 8)
const HALF: f64 = 2048

/** A stretch of flight inside a cell. */
export class Segment {
  /**
   * From the closest approach to the inner wall of a cell; `b2s` is b^2 twice. By the vector instruction, which waits for nothing: the
   * compiler of Node gives the scalar one a register that the instruction before may still be writing to, and where it does the loop
   * takes twice as long.
   */
  @inline static toWall(cell: usize, b2s: v128): f64 {
    return f64x2.extract_lane(f64x2.sqrt(f64x2.sub(v128.load64_splat(cell), b2s)), 0)
  }

  /** The point of a segment from s on that decides its bin: `place` x 2^-32 along it, by the digits of a number from 1 to 2. */
  @inline static at(s: f64, step: f64, place: u32): f64 {
    return s + (reinterpret<f64>(((<u64>place) << 20) | 0x3ff0000000000000) - 1) * step
  }

  @inline static tally(cell: usize, at: f64, b2: f64, gain: f64): void {
    Segment.add(cell, (HALF * (at * abs(at))) / (b2 + at * at), gain)
  }

  /** The same where the point is known to lie past the closest approach. */
  @inline static tallyOutwards(cell: usize, at: f64, b2: f64, gain: f64): void {
    const at2 = at * at
    Segment.add(cell, (HALF * at2) / (b2 + at2), gain)
  }

  /** `square`: half the steps of the lookup times the signed square of the cosine. Halves and 1.5 x 2^52 cut a number to a whole one. */
  @inline static add(cell: usize, square: f64, gain: f64): void {
    const step = <usize>reinterpret<i64>(square + HALF - 0.5 + 6755399441055744)
    // A record of a cell has 32 bytes, its part of the tally 512.
    const slot = TALLY + ((cell - CELLS) << 4) + ((<usize>load<u8>(BIN_OF_FLIGHT + step)) << 3)
    store<f64>(slot, load<f64>(slot) + gain)
  }
}
