type StretchName = 'linear' | 'square root' | 'logarithmic'
const stretches: StretchName[] = ['linear', 'square root', 'logarithmic']

/** From which value to which colours go, in the unit shown. */
interface Limits {
  low: number
  high: number
}

/** What sliders reach; `even`: in equal steps, otherwise in those of the logarithm. */
interface Reach extends Limits {
  even: boolean
}

/** The steps of the sliders of a range. */
const RANGE_STEPS = 200

/**
 * The values that the sliders reach: of values that are positive, from the faintest (at most eight decades below the brightest) to the
 * brightest, in the logarithm; otherwise, and of magnitudes, from the least to the greatest, evenly.
 */
function reachOf(values: Float64Array, even: boolean): Reach {
  let [low, high] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]
  let signed = false
  for (const value of values) {
    if (!Number.isFinite(value)) continue
    if (value < 0) signed = true
    if (value > high) high = value
    if (value < low && (even || value > 0)) low = value
  }
  if (signed && !even) return reachOf(values, true)
  if (!(high > Number.NEGATIVE_INFINITY) || !Number.isFinite(low)) return { low: 0, high: 1, even: true }
  if (even) return { low, high: high > low ? high : low + 1, even }
  return { low: Math.max(low, high * 1e-8) * (low === high ? 0.1 : 1), high, even }
}

function valueAtStep(step: number, { low, high, even }: Reach): number {
  const t = step / RANGE_STEPS
  return even ? low + t * (high - low) : low * (high / low) ** t
}

function stepOfValue(value: number, { low, high, even }: Reach): number {
  const t = even ? (value - low) / (high - low) : Math.log(value / low) / Math.log(high / low)
  return Math.round(RANGE_STEPS * Math.min(1, Math.max(0, Number.isFinite(t) ? t : 0)))
}

/** The range that shows most of an image: a few pixels that outshine the rest, such as a star, do not set it. */
function usualRange(values: Float64Array, reach: Reach): Limits {
  if (reach.even) return { low: reach.low, high: reach.high }
  const lit = values.filter((value) => value > 0).sort()
  const common = lit[Math.max(0, lit.length - 1 - Math.max(4, Math.floor(values.length / 2000)))] ?? reach.high
  const high = reach.high > 10 * common ? common : reach.high
  const faint = lit[Math.floor(0.02 * lit.length)] ?? reach.low
  return { low: Math.min(Math.max(faint, high * 1e-5), high / 3), high }
}

/** Where a value lies between the ends of a range, 0 to 1 and beyond; NaN where it has no place. */
function placeOf(value: number, { low, high }: Limits, stretch: StretchName): number {
  if (stretch === 'logarithmic')
    return value > 0 ? Math.log(value / low) / Math.log(high / low) : Number.isNaN(value) ? value : -1
  const t = (value - low) / (high - low)
  return stretch === 'linear' ? t : Math.sign(t) * Math.sqrt(Math.abs(t))
}

/** The value at a place of a range: the inverse of `placeOf`. */
function valueAtPlace(t: number, { low, high }: Limits, stretch: StretchName): number {
  if (stretch === 'logarithmic') return low * (high / low) ** t
  return low + (stretch === 'linear' ? t : t * t) * (high - low)
}

/** Round numbers of an axis, about `count` of them. */
function roundTicks(low: number, high: number, count: number): number[] {
  const rough = Math.abs(high - low) / count
  const power = 10 ** Math.floor(Math.log10(rough))
  const step = power * ([1, 2, 5, 10].find((factor) => factor * power >= rough) ?? 10)
  const ticks: number[] = []
  for (let i = Math.ceil(Math.min(low, high) / step - 1e-9); i * step <= Math.max(low, high) + 1e-9 * step; i++)
    ticks.push(Number((i * step).toPrecision(12)))
  return ticks
}

/** Marks of a logarithmic axis, at most about `count` of them: powers of ten, with their multiples where there is room. */
function decadeTicks(low: number, high: number, count: number): number[] {
  if (high < 10 * low) return roundTicks(low, high, count)
  const [first, last] = [Math.floor(Math.log10(low)), Math.ceil(Math.log10(high))]
  const decades = Math.max(1, Math.log10(high / low))
  const every = Math.ceil(decades / count)
  const factors = [[1, 2, 3, 4, 5, 6, 7, 8, 9], [1, 2, 3, 5], [1, 3], [1]].find(
    (set) => set.length * Math.log10(high / low) <= count
  ) ?? [1]
  const ticks: number[] = []
  for (let power = first; power <= last; power++) {
    if (power % every !== 0) continue
    for (const factor of factors) ticks.push(Number(`${factor}e${power}`))
  }
  const within = ticks.filter((tick) => tick >= low * (1 - 1e-9) && tick <= high * (1 + 1e-9))
  return within.length > 1 ? within : roundTicks(low, high, count)
}

/** 256 colours of hexadecimal text as words of an ImageData. */
function colourWords(hex: string): Uint32Array {
  const part = (i: number) => Number.parseInt(hex.slice(i, i + 2), 16)
  return Uint32Array.from(
    { length: 256 },
    (_, i) => (0xff000000 | (part(6 * i + 4) << 16) | (part(6 * i + 2) << 8) | part(6 * i)) >>> 0
  )
}
