const raised = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/** A whole number in raised digits: -12 becomes ⁻¹². */
export function superscript(value: number): string {
  return String(value).replace(/[-\d]/g, (c) => (c === '-' ? '⁻' : raised[Number(c)]))
}

/** A short number for a label: plain between 0.001 and 9999, otherwise as `2×10⁻⁷`. */
export function shortNumber(value: number, digits = 3): string {
  if (value === 0) return '0'
  const rounded = Number(value.toPrecision(digits))
  const size = Math.abs(rounded)
  if (size >= 1e-3 && size < 1e4) return String(rounded).replace('-', '−')
  const [mantissa, exponent] = rounded.toExponential().split('e')
  const power = `10${superscript(Number(exponent))}`
  return mantissa === '1' ? power : `${mantissa.replace('-', '−')}×${power}`
}

/** A unit for people: `MJy/sr` stays, `mag/arcsec2` becomes `mag/arcsec²`, `um` becomes `µm`. */
export function unitText(unit: string): string {
  return unit.replace(/(?<=[a-z])-?\d+/g, (power) => superscript(Number(power))).replace(/\bum\b/g, 'µm')
}
