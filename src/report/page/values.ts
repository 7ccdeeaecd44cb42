// Scripts of this folder share one scope: see assets.ts. They have no imports.
type PictureData = import('../types.js').PictureData
type ChartData = import('../types.js').ChartData
type ReportUnit = import('../types.js').ReportUnit
type PageData = import('../types.js').PageData

/** The 32-bit reals of a base64 text. */
function realsOf(base64: string): Float32Array {
  return new Float32Array(Uint8Array.from(atob(base64), (character) => character.charCodeAt(0)).buffer)
}

/** A value and its 1 sigma, given in the first unit, in another, at wavelength number k. */
function converted(value: number, sigma: number, own: ReportUnit, unit: ReportUnit, k: number): { value: number; sigma: number } {
  if (own === unit) return { value, sigma }
  const ofMagnitude = 2.5 / Math.LN10
  const cgs = own.kind === 'magnitude' ? own.cgs[k] * 10 ** (-0.4 * value) : value * own.cgs[k]
  const cgsSigma = own.kind === 'magnitude' ? (cgs * sigma) / ofMagnitude : sigma * own.cgs[k]
  if (unit.kind === 'linear') return { value: cgs / unit.cgs[k], sigma: cgsSigma / unit.cgs[k] }
  return cgs > 0
    ? { value: -2.5 * Math.log10(cgs / unit.cgs[k]), sigma: (ofMagnitude * cgsSigma) / cgs }
    : { value: Number.NaN, sigma: Number.NaN }
}

const raisedDigits = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/** A number for people: `0.0123`, `4.5×10⁻⁷`. */
function numberText(value: number, digits = 6): string {
  if (!Number.isFinite(value)) return 'no value'
  if (value === 0) return '0'
  const rounded = Number(value.toPrecision(digits))
  const size = Math.abs(rounded)
  if (size >= 1e-3 && size < 1e6) return String(rounded).replace('-', '−')
  const [mantissa, exponent] = rounded.toExponential().split('e')
  const power = String(Number(exponent)).replace(/[-\d]/g, (c) => (c === '-' ? '⁻' : raisedDigits[Number(c)]))
  return mantissa === '1' ? `10${power}` : `${mantissa.replace('-', '−')}×10${power}`
}

/** Two digits without a power of ten. */
function plainText(value: number): string {
  return value > 0 ? value.toFixed(Math.max(0, Math.min(20, 1 - Math.floor(Math.log10(value))))) : '0'
}

/** A value with its error and unit; an error of NaN is left out. */
function measuredText(value: number, sigma: number, unit: string): string {
  if (!Number.isFinite(value)) return 'no value'
  const text = numberText(value)
  // Value and error share the power of ten, unless the error is far below the digits that are shown.
  const power = /10[⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+$/.exec(text)?.[0]
  const far = sigma > 0 && sigma < 1e-6 * Math.abs(value)
  if (power && Number.isFinite(sigma) && !far) {
    const size = 10 ** Math.floor(Math.log10(Math.abs(Number(value.toPrecision(6)))))
    return `(${numberText(value / size)} ± ${plainText(sigma / size)})×${power} ${unitWords(unit)}`
  }
  return `${text}${Number.isFinite(sigma) ? ` ± ${numberText(sigma, 2)}` : ''} ${unitWords(unit)}`
}

function unitWords(unit: string): string {
  return unit
    .replace(/(?<=[a-z])-?\d+/g, (power) => power.replace(/[-\d]/g, (c) => (c === '-' ? '⁻' : raisedDigits[Number(c)])))
    .replace('um', 'µm')
}

/** An element with attributes and children. */
function element<Tag extends keyof HTMLElementTagNameMap>(
  tag: Tag,
  attributes: Record<string, string> = {},
  ...children: (Node | string)[]
): HTMLElementTagNameMap[Tag] {
  const made = document.createElement(tag)
  for (const [name, value] of Object.entries(attributes)) made.setAttribute(name, value)
  made.append(...children)
  return made
}

/** A list to choose from, with its label; `onChange` gets the number of the entry. */
function choice(
  label: string,
  entries: string[],
  onChange: (index: number) => void
): { box: HTMLLabelElement; select: HTMLSelectElement } {
  const select = element('select', {}, ...entries.map((text, i) => element('option', { value: String(i) }, text)))
  select.addEventListener('change', () => onChange(select.selectedIndex))
  return { box: element('label', {}, label, select), select }
}

/** A slider over whole numbers, with its label and what its place means. */
function slider(label: string, most: number, onInput: (value: number) => void) {
  const input = element('input', { type: 'range', min: '0', max: String(most), step: '1' })
  const meaning = element('output')
  input.addEventListener('input', () => onInput(Number(input.value)))
  const show = (value: number, text: string) => {
    input.value = String(value)
    input.setAttribute('aria-valuetext', text)
    meaning.textContent = text
  }
  return { box: element('label', {}, element('span', {}, `${label} `, meaning), input), show }
}

function button(text: string, onClick: () => void, label = text): HTMLButtonElement {
  const made = element('button', { type: 'button', 'aria-label': label }, text)
  made.addEventListener('click', onClick)
  return made
}

/** The colours of the page in its present scheme. */
function pageColour(name: string): string {
  return getComputedStyle(document.documentElement).getPropertyValue(`--${name}`).trim()
}
