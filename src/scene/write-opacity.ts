import { formatQuantity } from '../units/quantity.js'
import type { ConstantsSpec, CurveSpec, GrainPopulation, MixturePart, OpacitySpec, PhaseLaw, SizesSpec } from './types.js'

type Yaml = Record<string, unknown>

const radius = (value: number) => formatQuantity(value, 'length')
const density = (value: number) => formatQuantity(value, 'density')

/** An entry of `opacities` as a scene file has it, with every default filled in. */
export function opacityYaml(spec: OpacitySpec): Yaml {
  const { law } = spec
  const phase = phaseYaml(spec.phase)
  switch (spec.law) {
    case 'table':
      return { law, file: spec.table.file, phase }
    case 'power':
      return { law, reference: referenceYaml(spec.reference), slope: spec.slope, scattering: spec.scattering, phase }
    case 'extinction-curve':
      return { law, ...curveYaml(spec.curve), reference: referenceYaml(spec.reference), scattering: spec.scattering, phase }
    case 'grains': {
      const [first, ...others] = spec.populations
      const alone = others.length === 0 && first.massFraction === 1
      return { law, ...(alone ? grainYaml(first) : { populations: spec.populations.map(populationYaml) }), phase }
    }
  }
}

function phaseYaml(phase: PhaseLaw): unknown {
  if (typeof phase === 'string') return phase
  if (phase.kind === 'table') return { table: phase.table.file }
  return { 'two-term': { first: phase.first, second: phase.second, share: phase.share } }
}

function referenceYaml({ wavelength, ...opacity }: { wavelength: number; absorption?: number; extinction?: number }): Yaml {
  const [[name, value]] = Object.entries(opacity)
  return { wavelength: formatQuantity(wavelength, 'wavelength'), [name]: formatQuantity(value, 'opacity') }
}

function curveYaml({ name, ...parameter }: CurveSpec): Yaml {
  return { curve: name, ...parameter }
}

function populationYaml(population: GrainPopulation): Yaml {
  return { 'mass-fraction': population.massFraction, ...grainYaml(population) }
}

function grainYaml({ constants, sizes, density: solid, porosity, coat }: GrainPopulation): Yaml {
  return {
    constants: constantsYaml(constants),
    sizes: sizesYaml(sizes),
    'grain-density': density(solid),
    porosity,
    ...(coat && {
      coat: {
        constants: constantsYaml(coat.constants),
        'volume-fraction': coat.volumeFraction,
        density: density(coat.density)
      }
    })
  }
}

function sizesYaml(sizes: SizesSpec): Yaml {
  if (sizes.kind === 'table') return { file: sizes.file }
  const range = { smallest: radius(sizes.smallest), largest: radius(sizes.largest) }
  if (sizes.kind === 'power') return { ...range, slope: sizes.slope }
  return { ...range, median: radius(sizes.median), width: sizes.width }
}

function constantsYaml(constants: ConstantsSpec): unknown {
  switch (constants.kind) {
    case 'table':
      return constants.table.file
    case 'oscillators': {
      const wavenumber = (value: number) => formatQuantity(value, 'wavenumber')
      const terms = constants.terms.map(({ at, strength, damping }) => ({
        at: wavenumber(at),
        strength,
        damping: wavenumber(damping)
      }))
      return { oscillators: { infinity: constants.infinity, terms } }
    }
    case 'handbook':
      return { handbook: constants.name }
    case 'constant':
      return { n: constants.n, k: constants.k }
    case 'bruggeman':
      return { bruggeman: constants.parts.map(partYaml) }
    case 'maxwell-garnett':
      return {
        'maxwell-garnett': { matrix: constantsYaml(constants.matrix), inclusions: constants.inclusions.map(partYaml) }
      }
  }
}

function partYaml({ constants, volumeFraction }: MixturePart): Yaml {
  return { constants: constantsYaml(constants), 'volume-fraction': volumeFraction }
}
