/**
 * The scene as the rest of the program sees it: every default filled in, every quantity in cgs, every angle in rad.
 * Lengths cm, masses g, luminosities erg/s, temperatures K, opacities cm2/g, wavelengths cm.
 */
export interface Scene {
  /** Path of the file the scene was read from; data files are relative to its folder. */
  file: string
  title: string
  distance: number
  /** Where the image centre lies on the sky (ICRS, deg), when the user gave it. */
  sky?: { raDeg: number; decDeg: number }
  seed: string
  sources: SourceSpec[]
  opacities: Record<string, OpacitySpec>
  dust: DustSpec[]
  grid: GridSpec
  effort: EffortSpec
  cameras: CameraSpec[]
  spectra: SpectrumSpec[]
  /** The scene file and then every data file it names, as they were read. */
  inputs: InputFile[]
  /** Where each part of the scene was written, for messages that arise after reading. */
  locate: (path: ScenePath) => SourceLocation
}

/** A file that a scene was made from. */
export interface InputFile {
  file: string
  /** SHA-256 of its bytes, hexadecimal (FIPS 180-4). */
  sha256: string
}

export type ScenePath = (string | number)[]

/** One-based line and column of a key in the scene file. */
export interface SourceLocation {
  file: string
  line: number
  column: number
}

export type Vector = [number, number, number]

export type SourceSpec = StarSpec | AmbientSpec

export interface StarSpec {
  name: string
  kind: 'star'
  /** Effective temperature of a blackbody star; undefined for a tabulated spectrum given without one. */
  temperature?: number
  luminosity: number
  /** Stellar radius; undefined only for a point star with a tabulated spectrum. */
  radius?: number
  at: Vector
  extent: 'point' | 'sphere'
  /** Linear limb-darkening coefficient u: I(mu) = I(1) (1 - u (1 - mu)). */
  limbDarkening: number
  spectrum: { kind: 'blackbody' } | { kind: 'table'; table: SpectrumTable }
}

/** A stellar spectrum read from a file: shape only, scaled to the luminosity. Wavelengths (cm) increase. */
export interface SpectrumTable {
  file: string
  wavelength: Float64Array
  /** Proportional to L_nu. */
  fluxNu: Float64Array
}

/** Isotropic light from outside the dust: the same intensity from every direction. */
export interface AmbientSpec {
  name: string
  kind: 'ambient'
  spectrum:
    | { kind: 'blackbodies'; terms: { temperature: number /** Factor on the intensity. */; dilution: number }[] }
    | { kind: 'interstellar' }
    | { kind: 'table'; table: IntensityTable }
  /** Factor on the intensity of the spectrum. */
  strength: number
}

/** Specific intensity read from a file, erg/s/cm2/Hz/sr. Wavelengths (cm) increase. */
export interface IntensityTable {
  file: string
  wavelength: Float64Array
  intensityNu: Float64Array
}

/** `computed`: the scattering matrix of Mie theory, for grains. */
export type PhaseLaw =
  | 'isotropic'
  | 'henyey-greenstein'
  | 'rayleigh'
  | 'computed'
  | TwoTermPhase
  | { kind: 'table'; table: MatrixTable }

/** Sum of two Henyey-Greenstein laws of these mean cosines; `share` of the light is scattered by the first. */
export interface TwoTermPhase {
  kind: 'two-term'
  first: number
  second: number
  share: number
}

/** A scattering matrix read from a file, of any scale, for all wavelengths; s12, s33 and s34 are 0 for a mere phase function. */
export interface MatrixTable {
  file: string
  /** rad, from 0 to pi */
  angles: Float64Array
  s11: Float64Array
  s12: Float64Array
  s33: Float64Array
  s34: Float64Array
}

export type OpacitySpec = PowerOpacitySpec | TableOpacitySpec | GrainsOpacitySpec | CurveOpacitySpec

export interface PowerOpacitySpec {
  law: 'power'
  reference: { wavelength: number; absorption: number }
  /** absorption ~ wavelength^-slope */
  slope: number
  scattering: {
    /** At the reference wavelength; at every wavelength when `slope` is absent. */
    albedo: number
    asymmetry: number
    /** Scattering opacity ~ wavelength^-slope, instead of a constant albedo. */
    slope?: number
  }
  phase: PhaseLaw
}

export interface TableOpacitySpec {
  law: 'table'
  table: OpacityTable
  phase: PhaseLaw
}

/** Optical properties read from a file. Wavelengths (cm) increase; opacities in cm2/g. */
export interface OpacityTable {
  file: string
  wavelength: Float64Array
  absorption: Float64Array
  scattering: Float64Array
  asymmetry: Float64Array
}

/** Grains whose optical properties follow from Mie theory. */
export interface GrainsOpacitySpec {
  law: 'grains'
  populations: GrainPopulation[]
  phase: PhaseLaw
}

/** Spheres of one make and many sizes. */
export interface GrainPopulation {
  /** Share of the mass of all grains; the shares sum to 1. */
  massFraction: number
  constants: ConstantsSpec
  sizes: SizesSpec
  /** Density of the solid without its pores, g/cm3. */
  density: number
  /** Share of vacuum in the volume of the grain (of its core, when it has a coat). */
  porosity: number
  /** Concentric coat with its share of the volume and the density of its material, g/cm3. */
  coat?: { constants: ConstantsSpec; volumeFraction: number; density: number }
}

/** Optical constants n + i k. Resonances and widths are wavenumbers, cm-1. */
export type ConstantsSpec =
  | { kind: 'table'; table: ConstantsTable }
  | { kind: 'oscillators'; infinity: number; terms: { at: number; strength: number; damping: number }[] }
  | { kind: 'handbook'; name: HandbookName }
  | { kind: 'constant'; n: number; k: number }
  | { kind: 'bruggeman'; parts: MixturePart[] }
  | { kind: 'maxwell-garnett'; matrix: ConstantsSpec; inclusions: MixturePart[] }

export interface MixturePart {
  constants: ConstantsSpec
  volumeFraction: number
}

/** Optical constants read from a file. Wavelengths (cm) increase. */
export interface ConstantsTable {
  file: string
  wavelength: Float64Array
  n: Float64Array
  k: Float64Array
}

export const handbookNames = [
  'silicon-carbide',
  'magnesium-oxide',
  'corundum-ordinary',
  'corundum-extraordinary',
  'quartz-ordinary'
] as const
export type HandbookName = (typeof handbookNames)[number]

/** Numbers of grains by radius (cm). */
export type SizesSpec =
  | { kind: 'power'; smallest: number; largest: number; slope: number }
  | { kind: 'lognormal'; smallest: number; largest: number; median: number; width: number }
  | { kind: 'table'; file: string; radius: Float64Array; number: Float64Array }

/** A published formula for extinction, scaled at one wavelength. */
export interface CurveOpacitySpec {
  law: 'extinction-curve'
  curve: CurveSpec
  reference: { wavelength: number; extinction: number }
  scattering: { albedo: number; asymmetry: number }
  phase: PhaseLaw
}

export type CurveSpec = { name: 'cardelli-1989'; rv: number } | { name: 'pei-1992'; galaxy: Galaxy }
export const galaxies = ['milky-way', 'large-magellanic-cloud', 'small-magellanic-cloud'] as const
export type Galaxy = (typeof galaxies)[number]

export interface DustSpec {
  name: string
  /** Key into `Scene.opacities`. */
  opacity: string
  shape: ShapeSpec
  /** Fixes the density before anything is carved from it. */
  amount: AmountSpec
  /** `solve`: radiative equilibrium; `none`: no thermal emission; a number: fixed, K. */
  temperature: 'solve' | 'none' | number
  carve?: CarveSpec[]
  clumps?: ClumpsSpec
  /** Dust that would be hotter is gone, K. */
  sublimation?: number
  /** Within this radius (cm) it is, as far as a run has found; beyond, `amount` fixes the density as ever. */
  hollow?: number
}

export type ShapeSpec = (
  | { kind: 'shell'; inner: number; outer: number /** density ~ r^slope */; slope: number }
  | {
      kind: 'disk'
      inner: number
      outer: number
      surfaceSlope: number
      scaleHeight: { value: number; at: number; flaring: number }
      /** Radius of the exponential edge. */
      taper?: number
    }
  | { kind: 'ring'; radius: number; width: number; scaleHeight: number; eccentricity: number; periapsis: number }
  | { kind: 'infall'; inner: number; outer: number; centrifugalRadius: number }
  | { kind: 'ball'; radius: number; at: Vector }
  | { kind: 'slab'; thickness: number; width: number; at: Vector }
  | { kind: 'field'; width: number; at: Vector; data: DensityCube | DensityPoints }
) & {
  /** Tips the axis of the shape by `angle` from z towards the azimuth `toward`, rad. */
  tilt?: { angle: number; toward: number }
  /** The inner radius is to be found; until then it, and an outer one that follows from it, are NaN. */
  sought?: SoughtInner
}

/** The inner radius is where the component reaches a temperature, K; `timesInner`: outer over inner radius, where it was given so. */
export interface SoughtInner {
  temperature: number
  timesInner?: number
}

/** Relative density in equal cubes, read from a FITS file; x varies fastest. */
export interface DensityCube {
  kind: 'cube'
  file: string
  /** Numbers of cubes along x, y, z. */
  size: Vector
  values: Float32Array | Float64Array
}

/** Points with smoothing lengths, read from a CSV file; lengths in cm from the middle of the field, masses relative. */
export interface DensityPoints {
  kind: 'points'
  file: string
  x: Float64Array
  y: Float64Array
  z: Float64Array
  smoothingLength: Float64Array
  mass: Float64Array
}

/** Dust taken away: `remaining` is the fraction of the density that stays between two radii, or in a double cone about the axis. */
export type CarveSpec =
  | { kind: 'gap'; from: number; to: number; remaining: number }
  | { kind: 'cavity'; halfAngle: number; remaining: number }

/** Spheres in which the density is `contrast` times that between them; the mass of the component is kept. */
export interface ClumpsSpec {
  count: number
  radius: number
  contrast: number
  seed: string
}

export type AmountSpec =
  | { kind: 'mass'; mass: number }
  | { kind: 'optical-depth'; opticalDepth: number; at: number }
  | { kind: 'density'; density: number; at: number }

export interface GridSpec {
  kind: 'auto' | 'spherical' | 'octree'
  /** Numbers of spherical cells that the user fixed; 0 where the program chooses. */
  radial: number
  polar: number
  azimuthal: number
  /** Side of the whole cube of an octree about the origin, cm; 0 where the program chooses. */
  width: number
  /** Deepest level of an octree. */
  finest: number
  cellsAtMost: number
}

export interface EffortSpec {
  /** Relative 1 sigma to reach, or null: spend exactly the packets given. */
  precision: number | null
  /** Most packets for the dust temperatures. */
  equilibrium: number
  /** Most packets for each wavelength of cameras and spectra. */
  cameras: number
  /** True when the user asked for temperatures (`effort.equilibrium` given) even without any camera. */
  equilibriumAsked: boolean
}

/** What a camera sees its picture from: far away, or a place. */
export type CameraView = ViewSpec | PlaceViewSpec

/** An observer far away, who sees along parallel lines. Angles in rad. */
export interface ViewSpec {
  inclination: number
  azimuth: number
  roll: number
}

/** An observer at a place of the scene, who looks `toward` another (cm); an all-sky map has the longitude of that in its middle. */
export interface PlaceViewSpec {
  from: Vector
  toward: Vector
  /** Turns the projected +z axis from north to east, rad. */
  roll: number
  allSky: boolean
}

export interface CameraSpec {
  name: string
  view: CameraView
  /** Full width and height, rad. */
  field: [number, number]
  pixels: [number, number]
  /** cm, increasing */
  wavelengths: number[]
  unit: string
}

export interface SpectrumSpec {
  name: string
  view: ViewSpec
  /** Radius on the sky, rad; Infinity for all. */
  aperture: number
  /** cm, increasing */
  wavelengths: number[]
  unit: string
}
