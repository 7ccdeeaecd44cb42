import { z } from 'zod'
import type { ShapeSpec, SoughtInner } from '../types.js'
import { dataFile, real, section } from './fields.js'
import { quantity, vector } from './quantity-field.js'

const length = quantity('length')

const inner = z
  .union(
    [
      length,
      section({ temperature: quantity('temperature').describe('Temperature that this component reaches at its inner edge') })
    ],
    { error: () => 'a length with its unit, such as `6 au`, or {temperature: 1500 K} is expected' }
  )
  .describe('Inner radius, or {temperature: 1500 K}')

const outer = z
  .union([length, section({ 'times-inner': real({ above: 1, below: 1e12 }).describe('Outer radius over inner radius') })], {
    error: () => 'a length with its unit, such as `3000 au`, or {times-inner: 1000} is expected'
  })
  .describe('Outer radius, or {times-inner: 1000}')

const tilt = section({
  angle: quantity('angle', 'any').describe('Angle between z and the axis of the shape'),
  toward: quantity('angle', 'any').prefault('0 deg').describe('Azimuth that the axis leans to')
})
  .optional()
  .describe('Tips the shape')

const place = vector().prefault(['0 au', '0 au', '0 au']).describe('Centre, default the origin')

const shell = section({
  kind: z.literal('shell').describe('Spherical shell, density ~ r^slope'),
  inner,
  outer,
  slope: real({ from: -20, to: 20 }).prefault(-2).describe('Power of the density, default -2'),
  tilt
}).transform(({ kind, slope, tilt, ...edges }, context) => ({
  kind,
  ...resolveEdges(edges, context),
  slope,
  ...(tilt && { tilt })
}))

const scaleHeight = section({
  value: length.describe('Scale height at the radius `at`'),
  at: length,
  flaring: real({ from: -10, to: 10 }).describe('Scale height ~ R^flaring')
})

const disk = section({
  kind: z.literal('disk').describe('Flared disk'),
  inner,
  outer,
  'surface-slope': real({ from: -20, to: 20 }).prefault(-1).describe('Power of the surface density, default -1'),
  'scale-height': scaleHeight.describe('{value: 10 au, at: 100 au, flaring: 1.25}'),
  taper: section({ at: length }).optional().describe('Exponential edge with index 2 + surface-slope'),
  tilt
}).transform((written, context) => {
  const surfaceSlope = written['surface-slope']
  if (written.taper && surfaceSlope <= -2)
    context.issues.push({
      code: 'custom',
      message: 'an exponential edge needs a `surface-slope` above -2',
      path: ['taper'],
      input: written
    })
  return {
    kind: written.kind,
    ...resolveEdges(written, context),
    surfaceSlope,
    scaleHeight: written['scale-height'],
    ...(written.taper && { taper: written.taper.at }),
    ...(written.tilt && { tilt: written.tilt })
  }
})

const ball = section({ kind: z.literal('ball').describe('Uniform sphere'), radius: length, at: place, tilt })

const ring = section({
  kind: z.literal('ring').describe('Gaussian ring'),
  radius: length.describe('Semi-major axis of the densest ellipse'),
  width: length.describe('Gaussian sigma in radius'),
  'scale-height': length.describe('Gaussian sigma in height'),
  eccentricity: real({ from: 0, below: 1 }).prefault(0).describe('The origin is a focus; default 0'),
  periapsis: quantity('angle', 'any').prefault('0 deg').describe('Azimuth of the periapsis'),
  tilt
}).transform(({ 'scale-height': scaleHeight, tilt, ...written }) => ({ ...written, scaleHeight, ...(tilt && { tilt }) }))

const infall = section({
  kind: z.literal('infall').describe('Rotating infall (Ulrich 1976)'),
  inner,
  outer,
  'centrifugal-radius': length.describe('Radius at which matter of the equator meets the midplane'),
  tilt
}).transform(({ kind, 'centrifugal-radius': centrifugalRadius, tilt, ...edges }, context) => ({
  kind,
  ...resolveEdges(edges, context),
  centrifugalRadius,
  ...(tilt && { tilt })
}))

const slab = section({
  kind: z.literal('slab').describe('Uniform box, thickness along z'),
  thickness: length,
  width: length.describe('Width along x and y'),
  at: place,
  tilt
})

const field = section({
  kind: z.literal('field').describe('Density from a file'),
  file: dataFile.describe(
    'FITS cube of relative density, or CSV of points with x, y, z, smoothing-length (with units, from the middle of the field) and mass (relative, default 1)'
  ),
  width: length.describe('Width of the cube along x, or of the box outside of which points do not count'),
  at: place,
  tilt
})

/** A shape whose data file, if it has one, is not read yet. */
export type WrittenShape = Exclude<ShapeSpec, { kind: 'field' }> | z.output<typeof field>

/** `shape` of a dust component. */
export const shapeSchema = z
  .discriminatedUnion('kind', [shell, disk, ring, infall, ball, slab, field])
  .transform((shape): WrittenShape => shape)

interface Edges {
  inner: number | { temperature: number }
  outer: number | { 'times-inner': number }
}

function resolveEdges(
  { inner, outer }: Edges,
  context: z.RefinementCtx<unknown>
): { inner: number; outer: number; sought?: SoughtInner } {
  const timesInner = typeof outer === 'number' ? undefined : outer['times-inner']
  const from = typeof inner === 'number' ? inner : Number.NaN
  const to = typeof outer === 'number' ? outer : from * outer['times-inner']
  if (from >= to) context.issues.push({ code: 'custom', message: 'must be less than `outer`', path: ['inner'], input: inner })
  if (typeof inner === 'number') return { inner: from, outer: to }
  return { inner: from, outer: to, sought: { temperature: inner.temperature, ...(timesInner !== undefined && { timesInner }) } }
}
