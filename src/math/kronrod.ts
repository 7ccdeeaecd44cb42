/**
 * Nested pair of quadrature rules on (-1, 1): Gauss-Legendre with 7 points inside Gauss-Kronrod with 15 (Kronrod 1965; digits of
 * Piessens et al. 1983, QUADPACK), exact for polynomials of degree 13 and 22. The difference of the two sums is a cautious estimate
 * of the error of the larger rule.
 */
const HALF = [
  // abscissa, Kronrod weight, Gauss weight
  [0.9914553711208126, 0.022935322010529224, 0],
  [0.9491079123427585, 0.06309209262997856, 0.1294849661688697],
  [0.8648644233597691, 0.10479001032225019, 0],
  [0.7415311855993945, 0.14065325971552592, 0.27970539148927664],
  [0.5860872354676911, 0.1690047266392679, 0],
  [0.4058451513773972, 0.19035057806478542, 0.3818300505051189],
  [0.20778495500789848, 0.20443294007529889, 0]
] as const

const MIDDLE = [0, 0.20948214108472782, 0.4179591836734694] as const

const ALL = [...HALF.map(([x, kronrod, gauss]) => [-x, kronrod, gauss]), MIDDLE, ...[...HALF].reverse()]

export const kronrodNodes = Float64Array.from(ALL, ([x]) => x)
export const kronrodWeights = Float64Array.from(ALL, ([, weight]) => weight)
/** Weights of the 7-point rule; 0 at the nodes that are not its own. */
export const gaussWeights = Float64Array.from(ALL, ([, , weight]) => weight)
