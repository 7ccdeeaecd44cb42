/** s0, s1, s2 and carry of Baagoe's Alea generator, see math/random.ts. */
const state = memory.data(32)

/** Begins a stream of uniform numbers. */
export function startStream(s0: f64, s1: f64, s2: f64, carry: f64): void {
  store<f64>(state, s0)
  store<f64>(state, s1, 8)
  store<f64>(state, s2, 16)
  store<f64>(state, carry, 24)
}

export class Random {
  /** The next number of the stream, the same bits as in math/random.ts. */
  @inline static uniform(): f64 {
    const t = 2091639 * load<f64>(state) + load<f64>(state, 24) * 2.3283064365386963e-10
    store<f64>(state, load<f64>(state, 8))
    store<f64>(state, load<f64>(state, 16), 8)
    const carry = floor(t)
    const s2 = t - carry
    store<f64>(state, s2, 16)
    store<f64>(state, carry, 24)
    return s2 + 1.1641532182693481e-10
  }

  /** The whole number k of a uniform number, which is (k + 1/2) / 2^32. */
  @inline static whole(uniform: f64): u32 {
    return <u32>reinterpret<i64>(uniform * 4294967296 - 0.5 + 4503599627370496)
  }
}
