import { Random } from './random'

/** The tables of math/exponential.ts, one behind the other. */
export const LOG_TABLES = memory.data(2 * 256 * 8 + 33 * 8)
const LN2 = Math.LN2
const REST: usize = 256 * 8
const POWER: usize = 2 * 256 * 8

export class Deviate {
  /** -ln(u), as in math/exponential.ts. */
  @inline static exponential(u: f64): f64 {
    const scaled = u * 4294967296
    const k = Random.whole(u)
    const zeros = clz<u32>(k)
    const i = (((k << zeros) | ((1 << zeros) >>> 1)) >>> 23) & 255
    const d = scaled * load<f64>(LOG_TABLES + (zeros << 3), POWER) * load<f64>(LOG_TABLES + (i << 3)) - 1
    return <f64>zeros * LN2 + load<f64>(LOG_TABLES + (i << 3), REST) - (d - d * d * (1.0 / 2 - d * (1.0 / 3)))
  }
}
