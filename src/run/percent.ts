/** A fraction for people, as a percentage with two significant digits. */
export function percent(value: number): string {
  return `${Number((100 * value).toPrecision(2))} %`
}
