import { add, type Complex, complex, divide, multiply, scale, subtract } from '../../math/complex.js'
import { besselRatios } from './bessel-ratios.js'
import { type CoatWaves, coatWaves } from './coat-waves.js'
import { matchOutside } from './match-outside.js'
import { type ComplexArray, type MieSeries, seriesTerms } from './mie-series.js'
import { sphereSeries } from './sphere-series.js'

/**
 * Series of a sphere of size parameter x > 0 with a concentric core of size parameter 0 <= xCore <= x; refractive indices n + i k
 * relative to the medium around them. Written to `series`, which must have been made for x or more; nothing is checked.
 *
 * The field in the coat is psi_n minus a second solution that matches it to the core (Aden & Kerker 1951, J. Appl. Phys. 22, 1242;
 * Bohren & Huffman 1983, section 8.1). Only ratios are formed, of one function at neighbouring orders and of both functions between
 * core and surface, so nothing overflows (Yang 2003, Appl. Opt. 42, 1710, eqs. 7 to 23, written here for psi_{n+1} / psi_n, which
 * keeps the digits of small spheres).
 */
export function coatedSeries(series: MieSeries, xCore: number, x: number, mCore: Complex, mCoat: Complex): void {
  if (xCore === 0) {
    sphereSeries(series, x, mCoat.re, mCoat.im)
    return
  }
  const { inside, electric, magnetic } = series.scratch
  const [core, inner, outer] = inside
  const terms = seriesTerms(x)
  besselRatios(mCore.re * xCore, mCore.im * xCore, terms, core)
  besselRatios(mCoat.re * xCore, mCoat.im * xCore, terms, inner)
  besselRatios(mCoat.re * x, mCoat.im * x, terms, outer)

  const waves = coatWaves(xCore, x, mCoat)
  const difference = multiply(subtract(mCoat, mCore), add(mCoat, mCore))
  const contrast = scale(divide(difference, multiply(mCore, mCoat)), 1 / xCore)
  for (let n = 1; n <= terms; n++) {
    advance(waves, n, at(inner, n - 1), at(outer, n - 1))
    const coreField = at(core, n)
    const innerField = at(inner, n)
    const outerField = at(outer, n)

    const step = scale(contrast, n + 1)
    const a = subtract(step, multiply(mCoat, coreField))
    put(electric, n, blend(add(a, multiply(mCore, innerField)), add(a, multiply(mCore, waves.atCore)), outerField, waves))

    const b = multiply(mCore, coreField)
    put(
      magnetic,
      n,
      blend(subtract(multiply(mCoat, innerField), b), subtract(multiply(mCoat, waves.atCore), b), outerField, waves)
    )
  }
  matchOutside(series, x, mCoat.re, mCoat.im, electric, magnetic)
}

/** What takes the place of psi_{n+1} / psi_n at the surface, from the mismatches of psi and of the second solution at the core. */
function blend(mismatch: Complex, secondMismatch: Complex, outer: Complex, waves: CoatWaves): Complex {
  const share = divide(multiply(waves.quotient, mismatch), secondMismatch)
  return divide(subtract(outer, multiply(share, waves.atSurface)), subtract(complex(1), share))
}

/** From order n - 1 to order n, given psi_n / psi_{n-1} at the core and at the surface. */
function advance(waves: CoatWaves, n: number, inner: Complex, outer: Complex): void {
  const { quotient, atCore, atSurface, inverseCore, inverseSurface } = waves
  waves.quotient = multiply(quotient, divide(multiply(inner, atSurface), multiply(outer, atCore)))
  waves.atCore = subtract(scale(inverseCore, 2 * n + 1), divide(complex(1), atCore))
  waves.atSurface = subtract(scale(inverseSurface, 2 * n + 1), divide(complex(1), atSurface))
}

function at(array: ComplexArray, n: number): Complex {
  return { re: array.re[n], im: array.im[n] }
}

function put(array: ComplexArray, n: number, value: Complex): void {
  array.re[n] = value.re
  array.im[n] = value.im
}
