import { add, type Complex, complex, divide, multiply, scale } from '../../math/complex.js'

/** Radial functions in a coat at one order n, from the core (z = m_coat x_core) to the surface (z = m_coat x). */
export interface CoatWaves {
  /** second_{n+1} / second_n of the second solution. */
  atCore: Complex
  atSurface: Complex
  /** psi_n / second_n at the core, over the same at the surface. */
  quotient: Complex
  /** 1 / z. */
  inverseCore: Complex
  inverseSurface: Complex
}

/** Im z at the surface from which on the wave that decays outward serves as the second solution. */
const OPAQUE = 1

/**
 * Order 0. The second solution is chi_n, whose ratios are real in a transparent coat, so that no rounding poses as absorption; in an
 * opaque coat, where chi_n and psi_n become alike, it is xi_n = psi_n - i chi_n.
 */
export function coatWaves(xCore: number, x: number, mCoat: Complex): CoatWaves {
  const zCore = scale(mCoat, xCore)
  const zSurface = scale(mCoat, x)
  const inverseCore = divide(complex(1), zCore)
  const inverseSurface = divide(complex(1), zSurface)
  if (zSurface.im >= OPAQUE) {
    // xi_1 / xi_0 = 1 / z - i; psi_0 / xi_0 = (1 - exp(-2iz)) / 2, so the quotient is exp(2i (z - z')) (exp(2iz') - 1) / (exp(2iz) - 1)
    const decay = expm1i(2 * (zSurface.re - zCore.re), 2 * (zSurface.im - zCore.im))
    return {
      atCore: add(inverseCore, complex(0, -1)),
      atSurface: add(inverseSurface, complex(0, -1)),
      quotient: multiply(
        add(decay, complex(1)),
        divide(expm1i(2 * zCore.re, 2 * zCore.im), expm1i(2 * zSurface.re, 2 * zSurface.im))
      ),
      inverseCore,
      inverseSurface
    }
  }
  // chi_1 / chi_0 = 1 / z + tan z; psi_0 / chi_0 = tan z
  const tanCore = tangent(zCore)
  const tanSurface = tangent(zSurface)
  return {
    atCore: add(inverseCore, tanCore),
    atSurface: add(inverseSurface, tanSurface),
    quotient: divide(tanCore, tanSurface),
    inverseCore,
    inverseSurface
  }
}

/** exp(i (re + i im)) - 1 without cancellation, im >= 0. */
function expm1i(re: number, im: number): Complex {
  const size = Math.exp(-im)
  const half = Math.sin(0.5 * re)
  return { re: Math.expm1(-im) - 2 * size * half * half, im: size * Math.sin(re) }
}

/** tan z for moderate Im z (Abramowitz & Stegun 1964, 4.3.57, with the denominator 2 (cos^2 x + sinh^2 y)). */
function tangent({ re, im }: Complex): Complex {
  const cos = Math.cos(re)
  const sinh = Math.sinh(im)
  const size = cos * cos + sinh * sinh
  return { re: (Math.sin(re) * cos) / size, im: (sinh * Math.cosh(im)) / size }
}
