import { describe, expect, it } from 'vitest'
import { rayleighMatrix, scalarMatrix } from '../../src/dust/matrices.js'
import type { ScatteringMatrix } from '../../src/dust/scattering-matrix.js'
import { scatteringTables, tableAngles } from '../../src/dust/scattering-tables.js'
import { SphericalWalk } from '../../src/grid/walk.js'
import { stream } from '../../src/math/random.js'
import { FRAME, observerFrames } from '../../src/transport/observer-frame.js'
import { Polarisation } from '../../src/transport/polarisation.js'
import { scatterTowards } from '../../src/transport/scatter-towards.js'

type Complex = [re: number, im: number]
const times = ([a, b]: Complex, [c, d]: Complex): Complex => [a * c - b * d, a * d + b * c]
const plus = ([a, b]: Complex, [c, d]: Complex): Complex => [a + c, b + d]
const scaled = ([a, b]: Complex, by: number): Complex => [a * by, b * by]
const dot = (a: number[], b: number[]) => a.reduce((sum, x, i) => sum + x * b[i], 0)
const cross = ([a, b, c]: number[], [x, y, z]: number[]) => [b * z - c * y, c * x - a * z, a * y - b * x]
const unit = (a: number[]) => a.map((x) => x / Math.sqrt(dot(a, a)))

/** Amplitudes of an invented sphere, smooth functions of the angle. */
const s1 = (angle: number): Complex => [1 + 0.3 * Math.cos(angle), 0.4 * Math.sin(angle) ** 2 + 0.1]
const s2 = (angle: number): Complex => [
  (1 + 0.3 * Math.cos(angle)) * Math.cos(angle) + 0.5 * Math.sin(angle) ** 2,
  0.1 * Math.cos(angle) - 0.3 * Math.sin(angle) ** 2
]

/** The matrix of those amplitudes (Bohren & Huffman 1983, eq. 4.77), not normalised. */
function matrixOfAmplitudes(): ScatteringMatrix {
  const angles = tableAngles()
  const element = (of: (one: Complex, two: Complex) => number) => angles.map((angle) => of(s1(angle), s2(angle)))
  return {
    angles,
    s11: element((one, two) => 0.5 * (dot(two, two) + dot(one, one))),
    s12: element((one, two) => 0.5 * (dot(two, two) - dot(one, one))),
    s33: element((one, two) => one[0] * two[0] + one[1] * two[1]),
    s34: element((one, two) => two[1] * one[0] - two[0] * one[1])
  }
}

/**
 * Stokes parameters of an electric vector (time as exp(-i omega t)) in a frame seen by the receiver with b counter-clockwise from a:
 * V > 0 where b lags a by a quarter, E_b = i E_a, which turns from a to b (IAU 1974; from memory).
 */
const stokesOf = (a: Complex, b: Complex) => [
  dot(a, a) + dot(b, b),
  dot(a, a) - dot(b, b),
  2 * (a[0] * b[0] + a[1] * b[1]),
  2 * (a[0] * b[1] - a[1] * b[0])
]

const uniform = stream('scatter-towards')
const direction = () => unit([uniform(), uniform(), uniform()].map((x) => 2 * x - 1))
const phase = (): Complex => [2 * uniform() - 1, 2 * uniform() - 1]

describe('light scattered towards an observer', () => {
  it('has the Stokes parameters of its electric vector, followed by the amplitudes (Bohren & Huffman 1983, eq. 3.12)', () => {
    const matrix = matrixOfAmplitudes()
    const tables = scatteringTables([matrix])
    const norm = matrix.s11[0] / tables.elements[0]
    const seen = new Float64Array(4)
    for (let n = 0; n < 300; n++) {
      const k = direction()
      const d = unit(cross(k, direction()))
      const e = cross(k, d)
      const [fieldD, fieldE] = [phase(), phase()]
      const [i, q, u, v] = stokesOf(fieldD, fieldE)
      const o = direction()
      const frames = observerFrames(Float64Array.from(o))
      const [north, east] = [Array.from(frames.subarray(3, 6)), Array.from(frames.subarray(6, 9))]
      scatterTowards(tables, 0, Float64Array.from([...k, ...d, ...e]), 0, q / i, u / i, v / i, frames, 0, seen, 0)

      // Parallel to the plane of scattering, turned with the flight, and across it: E_par = S2 E_par, E_per = S1 E_per.
      const normal = unit(cross(k, o))
      const angle = Math.acos(dot(k, o))
      const along = cross(normal, k)
      const parallel = times(s2(angle), plus(scaled(fieldD, dot(d, along)), scaled(fieldE, dot(e, along))))
      const across = times(s1(angle), plus(scaled(fieldD, dot(d, normal)), scaled(fieldE, dot(e, normal))))
      const after = cross(normal, o)
      const field = (axis: number[]) => plus(scaled(parallel, dot(after, axis)), scaled(across, dot(normal, axis)))
      stokesOf(field(north), field(east)).forEach((exact, part) => {
        expect(seen[part]).toBeCloseTo(exact / i / norm, 5)
      })
    }
  })

  it('is what packets that scatter bring there, in intensity and polarisation', () => {
    const tables = scatteringTables([matrixOfAmplitudes()])
    const walk = new SphericalWalk({ r: Float64Array.of(0, 1), cosTheta: Float64Array.of(1, -1), phi: Float64Array.of(0, 7) })
    const start = { q: 0.5, u: -0.6, v: 0.4 }
    const packet = new Polarisation()
    const out = new Float64Array(3)
    const size = { mu: 4, phi: 6 }
    const cells = size.mu * size.phi
    const found = new Float64Array(4 * cells)
    const square = new Float64Array(4 * cells)
    const packets = 400_000
    // Every packet flies along x; the place of its new direction among even cells of the sphere is asked for.
    for (let n = 0; n < packets; n++) {
      packet.reset(1, 0, 0)
      Object.assign(packet.stokes, start)
      walk.startAt(0, 0, 0, 1, 0, 0)
      packet.scatter(tables, 0, walk, 0, uniform, out)
      const [x, y, z] = out
      const cell =
        Math.floor(((z + 1) / 2) * size.mu) * size.phi + Math.floor((0.5 + Math.atan2(y, x) / (2 * Math.PI)) * size.phi)
      // Referred to the north of an observer who catches it.
      const frame = observerFrames(out)
      const axes = [Array.from(packet.frame.subarray(3, 6)), Array.from(packet.frame.subarray(6, 9))]
      const [cos, sin] = axes.map((axis) => dot(axis, Array.from(frame.subarray(3, 6))))
      packet.stokes.refer(cos, sin)
      ;[1, packet.stokes.q, packet.stokes.u, packet.stokes.v].forEach((value, part) => {
        found[4 * cell + part] += value
        square[4 * cell + part] += value * value
      })
    }
    // The same by a sum over directions.
    const expected = new Float64Array(4 * cells)
    packet.reset(1, 0, 0)
    const fine = 60
    const seen = new Float64Array(4)
    for (let cell = 0; cell < cells; cell++) {
      for (let i = 0; i < fine * fine; i++) {
        const z = -1 + (2 * (Math.floor(cell / size.phi) + (Math.floor(i / fine) + 0.5) / fine)) / size.mu
        const azimuth = -Math.PI + (2 * Math.PI * ((cell % size.phi) + ((i % fine) + 0.5) / fine)) / size.phi
        const rho = Math.sqrt(1 - z * z)
        const frame = observerFrames(Float64Array.of(rho * Math.cos(azimuth), rho * Math.sin(azimuth), z))
        scatterTowards(tables, 0, packet.frame, 0, start.q, start.u, start.v, frame, 0, seen, 0)
        for (let part = 0; part < 4; part++)
          expected[4 * cell + part] += ((4 * Math.PI) / cells / fine ** 2) * seen[part] * packets
      }
    }
    // 96 comparisons at 4.5 sigma: by chance once in 1500. The sum over directions is good to 1e-3.
    expected.forEach((value, i) => {
      expect(Math.abs(found[i] - value)).toBeLessThan(4.5 * Math.sqrt(square[i] + 1) + (1e-3 * packets) / cells)
    })
  })

  it('keeps no polarisation where the law says nothing about it', () => {
    const tables = scatteringTables([scalarMatrix(() => 1 / (4 * Math.PI)), rayleighMatrix()])
    const seen = new Float64Array(4)
    const frames = observerFrames(Float64Array.from(direction()))
    scatterTowards(tables, 0, Float64Array.of(1, 0, 0, 0, 1, 0, 0, 0, 1), 0, 0.6, -0.5, 0.3, frames, 0, seen, 0)
    expect(seen[0]).toBeCloseTo(1 / (4 * Math.PI), 12)
    expect(Array.from(seen.subarray(1))).toEqual([0, 0, 0].map(() => expect.closeTo(0, 12)))
    expect(frames).toHaveLength(FRAME)
  })
})
