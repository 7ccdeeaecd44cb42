import { add, type Complex, complex, divide, multiply, scale, subtract } from '../../math/complex.js'

/** A part of a mixture: permittivity and share of the volume. */
export interface Ingredient {
  permittivity: Complex
  share: number
}

const ONE = complex(1)
const MOST_STEPS = 1000
const size = (a: Complex) => Math.hypot(a.re, a.im)
const distance = (a: Complex, b: Complex) => size(subtract(a, b))
const sum = (values: readonly Complex[]) => values.reduce(add, complex(0))

/**
 * Permittivity of a matrix with small spheres of other materials in it (Maxwell Garnett 1904, Phil. Trans. R. Soc. A 203, 385):
 * (e - m) / (e + 2 m) = sum share_i (e_i - m) / (e_i + 2 m). The shares of the inclusions sum to 1 or less.
 */
export function maxwellGarnett(matrix: Complex, inclusions: readonly Ingredient[]): Complex {
  const polarisability = sum(
    inclusions.map(({ permittivity: e, share }) => scale(divide(subtract(e, matrix), add(e, scale(matrix, 2))), share))
  )
  return divide(multiply(matrix, add(ONE, scale(polarisability, 2))), subtract(ONE, polarisability))
}

/**
 * Permittivity of a mixture in which no ingredient is the matrix (Bruggeman 1935, Ann. Phys. 416, 636): the root of
 * sum share_i (e_i - e) / (e_i + 2 e) = 0 with Im e >= 0; the shares sum to 1.
 *
 * Written as e = F(e) = 1 / (3 sum share_i / (e_i + 2 e)), F maps the upper half plane into itself, so iterating it leads to the one
 * root there (Denjoy & Wolff 1926); Newton steps that stay in the half plane and come closer make that fast. To 1e-13.
 */
export function bruggeman(ingredients: readonly Ingredient[]): Complex {
  const step = (e: Complex) => {
    const inverses = ingredients.map(({ permittivity, share }) => ({
      share,
      inverse: divide(ONE, add(permittivity, scale(e, 2)))
    }))
    const total = sum(inverses.map(({ share, inverse }) => scale(inverse, share)))
    const squares = sum(inverses.map(({ share, inverse }) => scale(multiply(inverse, inverse), share)))
    return {
      next: divide(complex(1 / 3), total),
      slope: scale(divide(squares, multiply(total, total)), 2 / 3)
    }
  }
  const residual = (e: Complex) => distance(step(e).next, e)
  const mean = sum(ingredients.map(({ permittivity, share }) => scale(permittivity, share)))
  let e = add(mean, complex(0, 1e-2 * Math.max(...ingredients.map(({ permittivity }) => size(permittivity)))))
  for (let i = 0; i < MOST_STEPS; i++) {
    const { next, slope } = step(e)
    if (distance(next, e) <= 1e-14 * size(e)) break
    const newton = add(e, divide(subtract(next, e), subtract(ONE, slope)))
    const accepted = newton.im >= 0 && residual(newton) < residual(next)
    e = accepted ? newton : next
  }
  return { re: e.re, im: Math.max(0, e.im) }
}
