import { describe, expect, it } from 'vitest'
import { seenFrom } from '../../src/camera/frame.js'
import { RayIntegrator } from '../../src/camera/ray.js'
import { rayMedium } from '../../src/camera/ray-medium.js'
import { EMITTED } from '../../src/camera/ray-values.js'
import { cutByRims } from '../../src/grid/rims.js'
import { buildModel } from '../../src/model/build-model.js'
import { parseScene } from '../../src/scene/read.js'
import { dustLight } from '../../src/solve/dust-light.js'
import { givenTemperatures } from '../../src/solve/dust-temperatures.js'
import { AU } from '../../src/units/constants.js'

const [inner, outer] = [5 * AU, 60 * AU]

/** Glowing dust, opaque or not, that ends in vertical rims. */
const scene = parseScene(
  `
distance: 100 pc
sources: [{name: star, temperature: 4000 K, luminosity: 1 Lsun}]
opacities: {grains: {law: power, reference: {wavelength: 10 um, absorption: 100 cm2/g}, slope: 0}}
dust:
  - name: disk
    opacity: grains
    temperature: 150 K
    shape: {kind: disk, inner: 5 au, outer: 60 au, scale-height: {value: 4 au, at: 60 au, flaring: 1.2}}
    amount: {optical-depth: 1e-6, at: 10 um}
spectra: [{name: s, wavelengths: [10 um]}]
`,
  'rims.yaml'
)
const model = buildModel(scene)
const light = dustLight(model, givenTemperatures(model), 10e-4)
const { density } = model.components[0]

describe('vertical rims through spherical cells', () => {
  it('leave of a cell what lies between the cylinders', () => {
    // A shell from 5 to 13, between cylinders of 5 and 12: the sphere has (4 pi / 3) (b^2 - R^2)^(3/2) outside a cylinder (a bored bead).
    const walls = { r: Float64Array.of(0, 5, 13), cosTheta: Float64Array.of(1, -1), phi: Float64Array.of(0, 2 * Math.PI) }
    expect(cutByRims(walls, 5, 12).filled[1]).toBeCloseTo((144 ** 1.5 - 25 ** 1.5) / (13 ** 3 - 5 ** 3), 3)
  })

  it.each([0, 40, 75, 90])('are sharp for rays at %s degrees: what they meet is the integral of the density', (degrees) => {
    const inclination = (degrees * Math.PI) / 180
    const view = seenFrom(model, { inclination, azimuth: 0, roll: 0 })
    const rays = new RayIntegrator(rayMedium(model, light, undefined), view)
    const out = new Float64Array(rays.size)
    const { shape } = model.components[0]
    const { relativeDensity } = shape
    const [right, to] = [view.right, view.observer]
    const scale = model.components[0].mass / shape.totalMass
    const planck = light.emission[density.findIndex((rho) => rho > 0)] / density.find((rho) => rho > 0)!
    const columns: number[] = []
    const seen: number[] = []
    for (let i = 0; i < 60; i++) {
      // Along the long axis, through both rims.
      const x = (4.6 + (i * 61) / 60) * AU
      const along = (s: number) => {
        const [px, py, pz] = [0, 1, 2].map((k) => x * right[k] + s * to[k])
        return scale * relativeDensity(px, py, pz)
      }
      const across = Math.hypot(to[0], to[1])
      const hole = inner > x && across > 0 ? Math.sqrt(inner * inner - x * x) / across : 0
      const end = across > 1e-9 ? Math.min(Math.sqrt(Math.max(0, outer * outer - x * x)) / across, 60 * AU) : 60 * AU
      const column = end > hole && (x >= inner || across > 1e-9) ? pieces(along, hole, end) + pieces(along, -end, -hole) : 0
      rays.trace(x, 0, out, false)
      if (column === 0) expect(out[EMITTED]).toBe(0)
      columns.push(column)
      seen.push(out[EMITTED] / planck)
    }
    const most = Math.max(...columns)
    const deviations = columns.map((column, i) => Math.abs(seen[i] - column) / Math.max(column, 0.01 * most))
    deviations.sort((a, b) => a - b)
    // What is left is of cells: each has one density.
    expect(deviations[deviations.length >> 1]).toBeLessThan(0.02)
    expect(deviations[deviations.length - 1]).toBeLessThan(0.03)
  })
})

/** Integral over a path by the rule of the midpoint. */
function pieces(f: (s: number) => number, from: number, to: number): number {
  const steps = 2000
  const step = (to - from) / steps
  let sum = 0
  for (let i = 0; i < steps; i++) sum += step * f(from + (i + 0.5) * step)
  return sum
}
