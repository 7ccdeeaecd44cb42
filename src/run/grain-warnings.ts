import { makeGrain } from '../dust/grains/make-grain.js'
import { fluctuatingRadius } from '../dust/grains/single-photon.js'
import type { OpacityLaw } from '../dust/opacity-law.js'
import { planckNu } from '../dust/planck.js'
import { integrate } from '../math/quadrature.js'
import type { DustComponent, Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import { wavelengthLabel } from '../output/wavelength-label.js'
import type { GrainPopulation } from '../scene/types.js'
import { AU, ELECTRONVOLT, LIGHT_SPEED, PLANCK } from '../units/constants.js'
import { percent } from './percent.js'

/** Share of the mass in grains out of equilibrium, and error of the integration over sizes, that are worth a word. */
const SMALL_SHARE = 0.01
const ROUGH = 0.005
/** Beyond this wavelength (cm) polarised light of aligned grains is what is mostly observed. */
const EMITTED = 30e-4

/** Where grains do what is not modelled, or their optics are rough. */
export function grainWarnings(model: Model): string[] {
  return [...model.components.flatMap((component) => fluctuating(model, component)), ...rough(model), ...aligned(model)]
}

/** Isotropic part of light: its wavelengths (cm), and mean intensity, erg/s/cm2/Hz/sr, at a frequency (Hz). */
interface MeanLight {
  range: [number, number]
  meanIntensityNu: (nu: number) => number
}

/** Light of all sources at a radius (cm), not dimmed on its way. */
function lightAt({ stars, fields }: Model, radius: number): MeanLight[] {
  return [
    ...stars.map(({ spectrum: { range, luminosityNu } }) => ({
      range,
      meanIntensityNu: (nu: number) => luminosityNu(nu) / (4 * Math.PI * radius) ** 2
    })),
    ...fields.map(({ spectrum: { range, intensityNu } }) => ({ range, meanIntensityNu: intensityNu }))
  ]
}

/**
 * Grains that one photon heats above the temperature they would have in equilibrium: at the outer edge, with light that is not
 * dimmed. Dimmed light would make them colder still.
 */
function fluctuating(model: Model, { spec, law, shape }: DustComponent): string[] {
  const opacity = model.scene.opacities[spec.opacity]
  if (opacity.law !== 'grains' || spec.temperature !== 'solve') return []
  const light = lightAt(model, shape.outerRadius)
  const absorbed = (weight: (nu: number) => number) =>
    light.reduce((sum, { range, meanIntensityNu }) => {
      const perLog = (x: number) => {
        const nu = LIGHT_SPEED / Math.exp(x)
        return 4 * Math.PI * nu * meanIntensityNu(nu) * law.absorption(Math.exp(x)) * weight(nu)
      }
      return sum + integrate(perLog, Math.log(range[0]), Math.log(range[1]), 1e-3)
    }, 0)
  const power = absorbed(() => 1)
  const energy = power / absorbed((nu) => 1 / (PLANCK * nu))
  if (!Number.isFinite(energy)) return []
  const temperature = equilibriumTemperature(law, power)
  const radius = fluctuatingRadius(temperature, energy)
  const share = opacity.populations.reduce((sum, population) => sum + population.massFraction * massBelow(population, radius), 0)
  if (share < SMALL_SHARE) return []
  const [nm, ev] = [radius * 1e7, energy / ELECTRONVOLT].map((value) => Number(value.toPrecision(2)))
  return [
    `dust ${spec.name}: ${percent(share)} of its mass is in grains below ${nm} nm, which one photon (${ev} eV) heats above the ${temperature.toFixed(0)} K of equilibrium at ${Number((shape.outerRadius / AU).toPrecision(3))} au; temperatures that fluctuate are not modelled, and the near- and mid-infrared light of such grains is missing`
  ]
}

/** Temperature (K) at which dust emits what it absorbs per gram (erg/s/g). */
function equilibriumTemperature(law: OpacityLaw, absorbed: number): number {
  let [low, high] = [1, 1e4]
  for (let step = 0; step < 30; step++) {
    const middle = Math.sqrt(low * high)
    const emission = (x: number) => {
      const nu = LIGHT_SPEED / Math.exp(x)
      return nu * planckNu(nu, middle) * law.absorption(Math.exp(x))
    }
    const emitted = 4 * Math.PI * integrate(emission, Math.log(0.02 / middle), Math.log(50 / middle), 1e-3)
    if (emitted < absorbed) low = middle
    else high = middle
  }
  return low
}

/** Share of the mass of grains below a radius (cm). */
function massBelow(population: GrainPopulation, radius: number): number {
  const { smallest, largest, density } = makeGrain(population).sizes
  const mass = (to: number) => {
    const volume = (lnRadius: number) => density(Math.exp(lnRadius)) * Math.exp(4 * lnRadius)
    return to > smallest ? integrate(volume, Math.log(smallest), Math.log(to), 1e-6) : 0
  }
  return mass(Math.min(radius, largest)) / mass(largest)
}

function rough({ components }: Model): string[] {
  const laws = new Map(components.map(({ spec, law }) => [spec.opacity, law]))
  return [...laws].flatMap(([name, { roughness }]) =>
    roughness && roughness.error > ROUGH
      ? [
          `opacity ${name}: integration over sizes came to an error of ${percent(roughness.error)} at most, near ${wavelengthLabel(roughness.wavelength)}; large and nearly transparent grains have too many narrow resonances for more`
        ]
      : []
  )
}

function aligned({ scene, components }: Model): string[] {
  const computed = components.filter(({ law, spec }) => law.phase === 'computed' && spec.temperature !== 'none')
  const long = observedWavelengths(scene).find((wavelength) => wavelength > EMITTED)
  if (computed.length === 0 || long === undefined) return []
  return [
    `dust ${computed.map(({ spec }) => spec.name).join(', ')}: grains are spheres; at ${wavelengthLabel(long)} and beyond, emission of aligned grains would be polarised, and is not modelled`
  ]
}
