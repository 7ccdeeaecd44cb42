/** Complex number. */
export interface Complex {
  re: number
  im: number
}

export const complex = (re: number, im = 0): Complex => ({ re, im })

export const add = (a: Complex, b: Complex): Complex => ({ re: a.re + b.re, im: a.im + b.im })

export const subtract = (a: Complex, b: Complex): Complex => ({ re: a.re - b.re, im: a.im - b.im })

export const multiply = (a: Complex, b: Complex): Complex => ({
  re: a.re * b.re - a.im * b.im,
  im: a.re * b.im + a.im * b.re
})

export const scale = (a: Complex, factor: number): Complex => ({ re: factor * a.re, im: factor * a.im })

/** a / b; the squares of the parts of b must neither overflow nor all vanish. */
export function divide(a: Complex, b: Complex): Complex {
  const size = b.re * b.re + b.im * b.im
  return { re: (a.re * b.re + a.im * b.im) / size, im: (a.im * b.re - a.re * b.im) / size }
}

/** Square root with real part >= 0, and imaginary part of the sign of that of a (>= 0 for a real a); no cancellation. */
export function squareRoot(a: Complex): Complex {
  const size = Math.hypot(a.re, a.im)
  if (size === 0) return { re: 0, im: 0 }
  const large = Math.sqrt(0.5 * (size + Math.abs(a.re)))
  const small = a.im / (2 * large)
  return a.re >= 0 ? { re: large, im: small } : { re: Math.abs(small), im: a.im < 0 ? -large : large }
}
