import { seenFrom } from '../camera/frame.js'
import { StarDepths } from '../camera/star-depth.js'
import type { DustComponent, Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import { isFromPlace } from '../scene/is-from-place.js'
import type { Vector } from '../scene/types.js'
import { micrometres } from './findings.js'

/** Optical depths for extinction. */
export interface OpticalDepths {
  /** Of each component along its defining line, at every observed wavelength. */
  components: { name: string; line: string; wavelengths: ComponentDepth[] }[]
  /** Of all dust from each observer to the origin. */
  observers: {
    kind: 'camera' | 'spectrum'
    name: string
    /** Absent for a camera at a place of the scene. */
    inclinationDeg?: number
    wavelengths: { wavelengthUm: number; opticalDepth: number }[]
  }[]
}

export interface ComponentDepth {
  wavelengthUm: number
  opticalDepth: number
  absorption: number
  scattering: number
}

const CENTRE = { at: [0, 0, 0] as Vector, extent: 'point' as const }

const lines = {
  shell: 'radius',
  disk: 'midplane radius',
  ring: 'vertical, through the densest point',
  infall: 'midplane radius',
  ball: 'radius',
  slab: 'thickness',
  field: 'z, through the centre'
}

export function opticalDepths(model: Model): OpticalDepths {
  const { scene, components } = model
  const wavelengths = observedWavelengths(scene)
  const specs = [
    ...scene.cameras.map((spec) => ({ kind: 'camera' as const, spec })),
    ...scene.spectra.map((spec) => ({ kind: 'spectrum' as const, spec }))
  ]
  const observers = specs.map(({ kind, spec: { name, view } }) => ({
    kind,
    name,
    ...(!isFromPlace(view) && { inclinationDeg: Number(((view.inclination * 180) / Math.PI).toPrecision(12)) }),
    wavelengths: [] as { wavelengthUm: number; opticalDepth: number }[]
  }))
  for (const wavelength of wavelengths) {
    specs.forEach(({ spec }, i) => {
      if (!spec.wavelengths.includes(wavelength)) return
      const view = seenFrom(model, spec.view)
      const there = 'from' in view && Math.hypot(...view.from) === 0
      const opticalDepth = there ? 0 : new StarDepths({ ...model, stars: [] }, wavelength, view).to(CENTRE)(0, 0)
      observers[i].wavelengths.push({ wavelengthUm: micrometres(wavelength), opticalDepth })
    })
  }
  return {
    components: components.map((component) => ({
      name: component.spec.name,
      line: lines[component.spec.shape.kind],
      wavelengths: wavelengths.map((wavelength) => alongLine(component, wavelength))
    })),
    observers
  }
}

function alongLine({ scale, shape, law }: DustComponent, wavelength: number): ComponentDepth {
  const column = scale * shape.column
  const absorption = column * law.absorption(wavelength)
  const scattering = column * law.scattering(wavelength)
  return { wavelengthUm: micrometres(wavelength), opticalDepth: absorption + scattering, absorption, scattering }
}
