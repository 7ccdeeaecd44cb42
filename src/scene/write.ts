import { Document, isScalar, visit } from 'yaml'
import { formatQuantity } from '../units/quantity.js'
import { completeStar, type StarNumbers } from './complete-star.js'
import { isFromPlace } from './is-from-place.js'
import { logRange } from './log-range.js'
import type {
  AmbientSpec,
  AmountSpec,
  CameraSpec,
  CarveSpec,
  DustSpec,
  GridSpec,
  Scene,
  ShapeSpec,
  SoughtInner,
  SpectrumSpec,
  StarSpec,
  ViewSpec
} from './types.js'
import { opacityYaml } from './write-opacity.js'

type Yaml = Record<string, unknown>

const length = (value: number) => formatQuantity(value, 'length')
const angle = (value: number) => formatQuantity(value, 'angle')
const wavelength = (value: number) => formatQuantity(value, 'wavelength')
const temperature = (value: number) => formatQuantity(value, 'temperature')

/**
 * The scene as a scene file with every default filled in. Data files get absolute paths; read again under the same name,
 * the text gives an equal Scene, bit for bit.
 */
export function sceneYaml(scene: Scene): string {
  const { precision, equilibrium, cameras, equilibriumAsked } = scene.effort
  const document = new Document(
    {
      title: scene.title,
      distance: length(scene.distance),
      ...(scene.sky && { sky: { ra: `${scene.sky.raDeg} deg`, dec: `${scene.sky.decDeg} deg` } }),
      seed: scene.seed,
      sources: scene.sources.map((source) => (source.kind === 'star' ? starYaml(source) : ambientYaml(source))),
      opacities: Object.fromEntries(Object.entries(scene.opacities).map(([name, spec]) => [name, opacityYaml(spec)])),
      dust: scene.dust.map(dustYaml),
      grid: gridYaml(scene.grid),
      // Without `equilibrium` the same number of packets is the default, but nothing asks for temperatures by themselves.
      effort: { precision: precision ?? 'none', ...(equilibriumAsked && { equilibrium }), cameras },
      cameras: scene.cameras.map(cameraYaml),
      spectra: scene.spectra.map(spectrumYaml)
    },
    { aliasDuplicateObjects: false }
  )
  visit(document, {
    Seq: (_, node) => {
      node.flow = node.items.every(isScalar)
    },
    Map: (_, node) => {
      node.flow = node.items.length <= 4 && node.items.every(({ value }) => isScalar(value))
    }
  })
  return document.toString({ lineWidth: 0, flowCollectionPadding: false })
}

function starYaml(star: StarSpec): Yaml {
  return {
    name: star.name,
    kind: star.kind,
    ...starNumbersYaml(star),
    at: star.at.map(length),
    extent: star.extent,
    'limb-darkening': star.limbDarkening,
    ...(star.spectrum.kind === 'table' && { spectrum: { table: star.spectrum.table.file } })
  }
}

function ambientYaml({ name, kind, spectrum, strength }: AmbientSpec): Yaml {
  return { name, kind, spectrum: ambientSpectrumYaml(spectrum), strength }
}

function ambientSpectrumYaml(spectrum: AmbientSpec['spectrum']): unknown {
  if (spectrum.kind === 'interstellar') return spectrum.kind
  if (spectrum.kind === 'table') return { table: spectrum.table.file }
  return spectrum.terms.map(({ temperature: kelvin, dilution }) => ({ blackbody: temperature(kelvin), dilution }))
}

/** Those of luminosity, temperature and radius from which the others follow exactly. */
function starNumbersYaml(star: StarSpec): Yaml {
  const { temperature: kelvin, luminosity, radius } = star
  const spectrum = star.spectrum.kind === 'table' ? star.spectrum : undefined
  const pairs = [
    { temperature: kelvin, luminosity },
    { luminosity, radius },
    { temperature: kelvin, radius }
  ]
  const given: StarNumbers = pairs.find((pair) => {
    const completed = completeStar({ ...pair, extent: star.extent, spectrum })
    return (
      !('problem' in completed) &&
      completed.temperature === kelvin &&
      completed.luminosity === luminosity &&
      completed.radius === radius
    )
  })!
  return {
    ...(given.temperature !== undefined && { temperature: temperature(given.temperature) }),
    ...(given.luminosity !== undefined && { luminosity: formatQuantity(given.luminosity, 'luminosity') }),
    ...(given.radius !== undefined && { radius: length(given.radius) })
  }
}

function dustYaml({ name, opacity, shape, amount, temperature: given, sublimation, carve, clumps }: DustSpec): Yaml {
  return {
    name,
    opacity,
    shape: {
      ...shapeYaml(shape),
      ...(shape.tilt && { tilt: { angle: angle(shape.tilt.angle), toward: angle(shape.tilt.toward) } })
    },
    amount: amountYaml(amount),
    temperature: typeof given === 'number' ? temperature(given) : given,
    ...(sublimation !== undefined && { sublimation: temperature(sublimation) }),
    ...(carve && { carve: carve.map(carveYaml) }),
    ...(clumps && { clumps: { ...clumps, radius: length(clumps.radius) } })
  }
}

function carveYaml(cut: CarveSpec): Yaml {
  const { remaining } = cut
  return cut.kind === 'gap'
    ? { gap: { from: length(cut.from), to: length(cut.to), remaining } }
    : { cavity: { 'half-angle': angle(cut.halfAngle), remaining } }
}

function shapeYaml(shape: ShapeSpec): Yaml {
  switch (shape.kind) {
    case 'shell':
      return { kind: shape.kind, ...edgesYaml(shape), slope: shape.slope }
    case 'disk':
      return {
        kind: shape.kind,
        ...edgesYaml(shape),
        'surface-slope': shape.surfaceSlope,
        'scale-height': { ...shape.scaleHeight, value: length(shape.scaleHeight.value), at: length(shape.scaleHeight.at) },
        ...(shape.taper !== undefined && { taper: { at: length(shape.taper) } })
      }
    case 'ring':
      return {
        kind: shape.kind,
        radius: length(shape.radius),
        width: length(shape.width),
        'scale-height': length(shape.scaleHeight),
        eccentricity: shape.eccentricity,
        periapsis: angle(shape.periapsis)
      }
    case 'infall':
      return {
        kind: shape.kind,
        ...edgesYaml(shape),
        'centrifugal-radius': length(shape.centrifugalRadius)
      }
    case 'ball':
      return { kind: shape.kind, radius: length(shape.radius), at: shape.at.map(length) }
    case 'slab':
      return { kind: shape.kind, thickness: length(shape.thickness), width: length(shape.width), at: shape.at.map(length) }
    case 'field':
      return { kind: shape.kind, file: shape.data.file, width: length(shape.width), at: shape.at.map(length) }
  }
}

function edgesYaml({ inner, outer, sought }: { inner: number; outer: number; sought?: SoughtInner }): Yaml {
  return {
    inner: sought ? { temperature: temperature(sought.temperature) } : length(inner),
    outer: sought?.timesInner === undefined ? length(outer) : { 'times-inner': sought.timesInner }
  }
}

function amountYaml(amount: AmountSpec): Yaml {
  switch (amount.kind) {
    case 'mass':
      return { mass: formatQuantity(amount.mass, 'mass') }
    case 'optical-depth':
      return { 'optical-depth': amount.opticalDepth, at: wavelength(amount.at) }
    case 'density':
      return { density: formatQuantity(amount.density, 'density'), at: length(amount.at) }
  }
}

function cameraYaml({ name, view, field, pixels, wavelengths, unit }: CameraSpec): Yaml {
  const common = { pixels, wavelengths: wavelengthsYaml(wavelengths), unit }
  if (!isFromPlace(view)) return { name, view: viewYaml(view), field: field.map(angle), ...common }
  const { from, toward, roll, allSky } = view
  const place = { from: from.map(length), toward: toward.map(length) }
  return {
    name,
    view: allSky ? { ...place, field: 'all-sky' } : { ...place, field: field.map(angle), roll: angle(roll) },
    ...common
  }
}

function spectrumYaml({ name, view, aperture, wavelengths, unit }: SpectrumSpec): Yaml {
  const radius = aperture === Number.POSITIVE_INFINITY ? 'all' : angle(aperture)
  return { name, view: viewYaml(view), aperture: radius, wavelengths: wavelengthsYaml(wavelengths), unit }
}

function viewYaml({ inclination, azimuth, roll }: ViewSpec): Yaml {
  return { inclination: angle(inclination), azimuth: angle(azimuth), roll: angle(roll) }
}

/** A list, or the range that gives exactly the same one. */
function wavelengthsYaml(wavelengths: number[]): unknown {
  const [from, to, count] = [wavelengths[0], wavelengths[wavelengths.length - 1], wavelengths.length]
  const even = count > 2 && logRange(from, to, count).every((value, i) => value === wavelengths[i])
  return even ? { from: wavelength(from), to: wavelength(to), count } : wavelengths.map(wavelength)
}

function gridYaml({ kind, radial, polar, azimuthal, width, finest, cellsAtMost }: GridSpec) {
  if (kind === 'octree') return { kind, ...(width > 0 && { width: length(width) }), finest, 'cells-at-most': cellsAtMost }
  return { kind, ...Object.fromEntries(Object.entries({ radial, polar, azimuthal }).filter(([, count]) => count > 0)) }
}
