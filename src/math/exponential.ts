const STEPS = 256
const LN2 = Math.LN2
/** By the leading binary digits of a number in [1, 2): 1 / c and ln(2 / c) for the middle c of the step. */
const reciprocal = Float64Array.from({ length: STEPS }, (_, i) => 1 / (1 + (i + 0.5) / STEPS))
const rest = reciprocal.map((value) => LN2 + Math.log(value))
/** 2^(i - 31) */
const power = Float64Array.from({ length: 33 }, (_, i) => 2 ** (i - 31))

/** All of them one behind the other, for a loop that has memory of its own. */
export const logTables = Float64Array.of(...reciprocal, ...rest, ...power)

/**
 * -ln(u): an exponential deviate of mean 1 from a number of `stream`, which is u = (k + 1/2) / 2^32 with k a whole number. The zeros
 * that k begins with give the power of two, a table and a series the rest, to 4e-12 (the step of u is 2e-10). Inline in a loop,
 * where Math.log is a call.
 */
export function exponential(u: number): number {
  const scaled = u * 4294967296
  const k = scaled >>> 0
  const zeros = Math.clz32(k)
  const i = (((k << zeros) | ((1 << zeros) >>> 1)) >>> 23) & (STEPS - 1)
  const d = scaled * power[zeros] * reciprocal[i] - 1
  return zeros * LN2 + rest[i] - (d - d * d * (1 / 2 - d * (1 / 3)))
}
