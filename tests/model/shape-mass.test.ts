import { describe, expect, it } from 'vitest'
import { placeWalls } from '../../src/grid/place-walls.js'
import { cellDensities } from '../../src/model/density.js'
import type { DustSpec, ShapeSpec } from '../../src/scene/types.js'
import { makeShape } from '../../src/shapes/make-shape.js'

const DEGREE = Math.PI / 180
const cavity = { kind: 'cavity', halfAngle: 25 * DEGREE, remaining: 0 } as const
const gap = { kind: 'gap', from: 20, to: 30, remaining: 0.1 } as const
const disk: ShapeSpec = {
  kind: 'disk',
  inner: 1,
  outer: 300,
  surfaceSlope: -1,
  scaleHeight: { value: 10, at: 100, flaring: 1.25 }
}
const infall: ShapeSpec = { kind: 'infall', inner: 1, outer: 1000, centrifugalRadius: 50 }

/** Mass in the cells over the mass of the shape, before any correction, in walls for an optical depth of `tau` a unit of mass. */
function massRatio(spec: ShapeSpec, more: Pick<DustSpec, 'carve'>, tau: number, cells = {}): number {
  const shape = makeShape(spec, more)
  const dimensions = { spherical: 1, axial: 2, none: 3 }[shape.symmetry] as 1 | 2 | 3
  const layers = [{ shape, scale: tau / (shape.totalMass / shape.outerRadius ** 2), extinction: 1 }]
  return cellDensities(placeWalls({ layers, dimensions, radial: 0, polar: 0, azimuthal: 0, ...cells }), shape, 1).massRatio
}

describe('cells of every shape that is symmetric about z hold its mass to 1e-4', () => {
  it.each([
    ['ring', { kind: 'ring', radius: 100, width: 5, scaleHeight: 3, eccentricity: 0, periapsis: 0 }, {}],
    ['thin ring', { kind: 'ring', radius: 100, width: 0.3, scaleHeight: 0.2, eccentricity: 0, periapsis: 0 }, {}],
    ['ring that reaches the origin', { kind: 'ring', radius: 50, width: 30, scaleHeight: 9, eccentricity: 0, periapsis: 0 }, {}],
    ['infall', infall, {}],
    ['infall within the centrifugal radius', { ...infall, outer: 40 }, {}],
    ['infall with a cavity and a gap', infall, { carve: [cavity, gap] }],
    ['shell with a cavity', { kind: 'shell', inner: 1, outer: 100, slope: -1.5 }, { carve: [cavity] }],
    ['shell with a gap', { kind: 'shell', inner: 1, outer: 100, slope: -1.5 }, { carve: [gap] }],
    ['ball with a cavity', { kind: 'ball', radius: 100, at: [0, 0, 0] }, { carve: [cavity] }],
    ['disk with a gap', disk, { carve: [gap] }],
    ['disk with a wide cavity', disk, { carve: [{ ...cavity, halfAngle: 75 * DEGREE }] }]
  ] as [string, ShapeSpec, Pick<DustSpec, 'carve'>][])('%s', (_, spec, more) => {
    for (const tau of [0.01, 100]) expect(Math.abs(massRatio(spec, more, tau) - 1)).toBeLessThan(1e-4)
  })

  it('also where the user asks for few', () => {
    expect(Math.abs(massRatio(disk, { carve: [gap, cavity] }, 1, { radial: 20, polar: 5 }) - 1)).toBeLessThan(1e-4)
    expect(Math.abs(massRatio(infall, { carve: [cavity] }, 1, { radial: 20, polar: 2 }) - 1)).toBeLessThan(1e-4)
  })
})

describe('cells in three dimensions hold what they resolve', () => {
  it.each([
    ['eccentric ring', { kind: 'ring', radius: 100, width: 12, scaleHeight: 12, eccentricity: 0.3, periapsis: 1 }, 1e-3],
    ['ball elsewhere', { kind: 'ball', radius: 20, at: [30, 10, 20] }, 3e-3],
    ['tilted slab', { kind: 'slab', thickness: 20, width: 60, at: [0, 0, 0], tilt: { angle: 0.4, toward: 0.3 } }, 3e-3]
  ] as [string, ShapeSpec, number][])('%s', (_, spec, most) => {
    expect(Math.abs(massRatio(spec, {}, 1, { radial: 50, polar: 40, azimuthal: 40 }) - 1)).toBeLessThan(most)
  })
})
