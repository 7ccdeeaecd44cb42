import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { viewBasis } from '../../src/camera/view.js'

const degree = Math.PI / 180
const dot = (a: number[], b: number[]) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]

/** Position angle of the projected +z axis, from north through east; east is to the left of the picture. */
function positionAngleOfAxis(inclination: number, roll: number): number {
  const { up, right } = viewBasis({ inclination, azimuth: 0, roll })
  return Math.atan2(-right[2], up[2])
}

describe('viewBasis', () => {
  it('looks down on the +z side at inclination 0 and from the +x side at 90 deg', () => {
    expect(viewBasis({ inclination: 0, azimuth: 0, roll: 0 }).observer).toEqual([0, -0, 1])
    const side = viewBasis({ inclination: 90 * degree, azimuth: 0, roll: 0 })
    expect(side.observer[0]).toBeCloseTo(1, 12)
    expect(side.up[2]).toBeCloseTo(1, 12)
    // Seen from +x with +z up, +y lies to the right.
    expect(side.right[1]).toBeCloseTo(1, 12)
  })

  it('turns the scene counter-clockwise about z by the azimuth', () => {
    const { right, observer } = viewBasis({ inclination: 90 * degree, azimuth: 30 * degree, roll: 0 })
    const turned = [Math.cos(30 * degree), Math.sin(30 * degree), 0]
    // What was on the +x axis, turned by 30 deg, appears where (cos 30, sin 30) would without azimuth.
    expect(dot([1, 0, 0], observer)).toBeCloseTo(turned[0], 12)
    expect(dot([1, 0, 0], right)).toBeCloseTo(turned[1], 12)
  })

  it('turns the axis from north towards east by the roll', () => {
    expect(positionAngleOfAxis(60 * degree, 0)).toBeCloseTo(0, 12)
    expect(positionAngleOfAxis(60 * degree, 25 * degree)).toBeCloseTo(25 * degree, 12)
    expect(positionAngleOfAxis(60 * degree, -70 * degree)).toBeCloseTo(-70 * degree, 12)
  })

  it('is a right-handed frame of unit vectors', () => {
    const angle = fc.double({ min: -7, max: 7, noNaN: true })
    fc.assert(
      fc.property(angle, angle, angle, (inclination, azimuth, roll) => {
        const { observer, right, up } = viewBasis({ inclination, azimuth, roll })
        for (const vector of [observer, right, up]) expect(dot(vector, vector)).toBeCloseTo(1, 12)
        const cross = [
          right[1] * up[2] - right[2] * up[1],
          right[2] * up[0] - right[0] * up[2],
          right[0] * up[1] - right[1] * up[0]
        ]
        for (let i = 0; i < 3; i++) expect(cross[i]).toBeCloseTo(observer[i], 12)
      })
    )
  })
})
