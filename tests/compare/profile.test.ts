import { describe, expect, it } from 'vitest'
import { inPlace } from '../../src/compare/sets/compared-set.js'
import { profileSet } from '../../src/compare/sets/profile-set.js'
import type { ProfileData } from '../../src/compare/types.js'
import { parseTable } from '../../src/data/table.js'
import { ARCSECOND } from '../../src/units/angles.js'
import { cameraSource, firstWavelength, MJY } from '../observe/sources.js'

const never = (key: string, message: string): never => {
  throw new Error(`${key}: ${message}`)
}

function profile(along: 'radius' | 'angle', rows: number[], change: Partial<ProfileData> = {}): ProfileData {
  const head = along === 'radius' ? 'radius [arcsec]' : 'angle [deg]'
  const text = `${head}, intensity [MJy/sr], sigma [MJy/sr]\n${rows.map((at) => `${at}, 1, 0.5`).join('\n')}\n`
  return {
    name: 'p',
    kind: 'profile',
    camera: 'sky',
    light: { kind: 'line', wavelength: 1e-3 },
    table: parseTable(text, 'p.csv'),
    errors: 'sigma',
    along,
    ...change
  }
}

describe('a profile of a camera', () => {
  it('along the radius holds means over rings that meet half-way', () => {
    const source = cameraSource((east, north) => MJY * Math.exp(-(east ** 2 + north ** 2) / 2), {
      width: 100,
      height: 100,
      pixel: 0.08
    })
    const set = profileSet(profile('radius', [0.25, 0.75, 1.25, 2]), source, firstWavelength(source), never)
    const { values } = set.model(inPlace)
    // Mean of exp(-r^2/2) over a ring from a to b: 2 (exp(-a^2/2) - exp(-b^2/2)) / (b^2 - a^2).
    const edges = [0, 0.5, 1, 1.625, 2.375]
    edges.slice(1).forEach((outer, i) => {
      const [a, b] = [edges[i] ** 2, outer ** 2]
      expect(values[i] / MJY).toBeCloseTo((2 * (Math.exp(-a / 2) - Math.exp(-b / 2))) / (b - a), 2)
    })
    expect(set.data.values[0] / MJY).toBeCloseTo(1, 9)
    expect(set.data.sigma[0] / MJY).toBeCloseTo(0.5, 9)
  })

  it('along the angle holds means over sectors of a ring, from north towards east', () => {
    const source = cameraSource((east, north) => MJY * (1 + 0.5 * Math.cos(Math.atan2(east, north) - 1)), {
      width: 100,
      height: 100
    })
    const angles = [0, 60, 120, 180, 240, 300]
    const between: [number, number] = [1 * ARCSECOND, 4 * ARCSECOND]
    const { values } = profileSet(profile('angle', angles, { between }), source, firstWavelength(source), never).model(inPlace)
    // Mean of a cosine over 60 degrees: sin(30 deg) / (pi/6) of its middle.
    angles.forEach((angle, i) => {
      const expected = 1 + 0.5 * (Math.sin(Math.PI / 6) / (Math.PI / 6)) * Math.cos((angle * Math.PI) / 180 - 1)
      expect(values[i] / MJY).toBeCloseTo(expected, 2)
    })
  })

  it('outside the field of the camera is refused', () => {
    const source = cameraSource(() => MJY, { width: 20, height: 20 })
    expect(() => profileSet(profile('radius', [0.5, 1, 5, 6]), source, firstWavelength(source), never)).toThrow(
      'the camera sky shows nothing at row'
    )
  })
})
