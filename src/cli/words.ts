/** A number for people: `digits` significant digits, an exponent only where it is needed. */
export function shown(value: number, digits = 3): string {
  if (value === Number.POSITIVE_INFINITY) return 'infinite'
  if (!Number.isFinite(value)) return 'none'
  const size = Math.abs(value)
  return size !== 0 && (size < 1e-3 || size >= 1e6) ? value.toExponential(digits - 1) : String(Number(value.toPrecision(digits)))
}

/** Smaller relative errors have a power of ten of their own. */
const TINY = 1e-6

/** A value with its 1 sigma, both to the second digit of the error, such as `5.27 ± 0.03` or `(4.65753 ± 0.00079)e7`. */
export function withError(value: number, sigma: number): string {
  if (!(sigma > 0) || !Number.isFinite(value)) return shown(value, 4)
  if (sigma < TINY * Math.abs(value)) return `${shown(value, 7)} ± ${shown(sigma, 2)}`
  const size = Math.max(Math.abs(value), sigma)
  const exponent = size < 1e-3 || size >= 1e6 ? Math.floor(Math.log10(size)) : 0
  const decimals = Math.max(0, exponent + 1 - Math.floor(Math.log10(sigma)))
  const [mean, error] = [value, sigma].map((number) => (number / 10 ** exponent).toFixed(decimals))
  return exponent === 0 ? `${mean} ± ${error}` : `(${mean} ± ${error})e${exponent}`
}

/** A duration for people. */
export function duration(seconds: number): string {
  if (seconds < 9.95) return `${seconds.toPrecision(2)} s`
  if (seconds < 99.5) return `${seconds.toFixed(0)} s`
  if (seconds < 5970) return `${(seconds / 60).toFixed(0)} min`
  return seconds < 172_000 ? `${(seconds / 3600).toFixed(1)} h` : `${(seconds / 86400).toFixed(0)} days`
}

/** A wavelength in um for people, with the unit that suits it. */
export function wavelengthText(um: number): string {
  if (um < 1000) return `${shown(um)} um`
  return um < 10_000 ? `${shown(um / 1000)} mm` : `${shown(um / 10_000)} cm`
}

/** At most `count` elements of a list, evenly spread, the first and the last among them. */
export function some<Item>(items: Item[], count: number): Item[] {
  if (items.length <= count) return items
  return Array.from({ length: count }, (_, i) => items[Math.round((i * (items.length - 1)) / (count - 1))])
}

/** Lines of cells in columns, two spaces apart; the first column to the left, numbers as they come. */
export function table(rows: string[][], indent = '  '): string[] {
  const widths = rows.reduce<number[]>((most, row) => row.map((cell, i) => Math.max(cell.length, most[i] ?? 0)), [])
  return rows.map((row) => `${indent}${row.map((cell, i) => cell.padEnd(widths[i])).join('  ')}`.trimEnd())
}
