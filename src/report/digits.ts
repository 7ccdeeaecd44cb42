/** A number with that many significant digits at most. */
export const digits = (value: number, count = 5) => String(Number(value.toPrecision(count)))
