import type { IntensityField } from './field.js'

/**
 * A field stretched upwards, so that circles about the axis of a tilted disk are circles again: what is seen at y stands at
 * y / flattening. Areas grow by 1 / flattening.
 */
export function unflattened(field: IntensityField): IntensityField {
  const { flattening } = field
  if (flattening === 1) return field
  return {
    size: field.size,
    sample: (x, y, out, withGroups) => field.sample(x, y * flattening, out, withGroups),
    radii: field.radii,
    innermost: field.innermost,
    outermost: field.outermost / flattening,
    flattening: 1
  }
}
