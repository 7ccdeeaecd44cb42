/** What a scene of the bench is made with. */
interface Effort {
  /** Packets for each wavelength and for the temperatures, or the precision to reach. */
  packets?: number
  precision?: string
  /** Scattering law, default Henyey-Greenstein. */
  phase?: string
}

const cubesOf = (cubes: number, finest: number) => `grid: {kind: octree, cells-at-most: ${cubes}, finest: ${finest}}`

const effortOf = ({ packets, precision }: Effort) =>
  packets
    ? `{precision: none, cameras: ${packets}, equilibrium: ${packets}}`
    : `{precision: ${precision}, cameras: 1e9, equilibrium: 1e9}`

const dustOf = (slope: number, phase = 'henyey-greenstein') =>
  `{law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: ${slope}, scattering: {albedo: 0.6, asymmetry: 0.5}, phase: ${phase}}`

export const SHELL_FIELD = { text: '200 au', halfAu: 100 }
export const DISK_FIELD = { text: '420 au', halfAu: 210 }
export const PIXELS = 64

export interface ShellOptions extends Effort {
  depth: number
  /** Dust of this temperature (K) in place of the star, seen at 10 um. */
  glow?: number
  pixels?: number
}

/** A scattering shell about a star. */
export function shellScene({ depth, glow, pixels = PIXELS, phase, ...effort }: ShellOptions): string {
  return `title: Bench shell
distance: 100 pc
seed: bench
${glow ? '' : 'sources: [{name: star, temperature: 5000 K, luminosity: 100 Lsun}]'}
opacities: {grains: ${dustOf(0, phase)}}
dust:
  - name: shell
    opacity: grains
    shape: {kind: shell, inner: 10 au, outer: 100 au, slope: -2}
    amount: {optical-depth: ${depth}, at: 1 um}
    temperature: ${glow ? `${glow} K` : 'none'}
effort: ${effortOf(effort)}
cameras:
  - {name: c0, field: ${SHELL_FIELD.text}, pixels: ${pixels}, wavelengths: [${glow ? 10 : 1} um], unit: erg/s/cm2/Hz/sr}
`
}

export interface DiskOptions extends Effort {
  depth: number
  /** deg */
  inclinations?: number[]
  pixels?: number
  /** radial, polar, azimuthal */
  grid?: [number, number, number]
  /** Cubes of an octree, so many, in place of spherical cells. */
  cubes?: number
  temperature?: 'none' | 'solve'
  /** Wavelengths of a spectrum in place of cameras. */
  wavelengths?: number
}

/** A flared disk about a star, in scattered light unless its temperature is solved. */
export function diskScene(options: DiskOptions): string {
  const {
    depth,
    inclinations = [60],
    pixels = PIXELS,
    grid,
    cubes,
    temperature = 'none',
    wavelengths,
    phase,
    ...effort
  } = options
  const camera = (inclination: number, i: number) =>
    `  - {name: c${i}, view: {inclination: ${inclination} deg}, field: ${DISK_FIELD.text}, pixels: ${pixels}, wavelengths: [1 um], unit: erg/s/cm2/Hz/sr}`
  return `title: Bench disk
distance: 140 pc
seed: bench
sources: [{name: star, temperature: 4500 K, luminosity: 2 Lsun}]
opacities: {grains: ${dustOf(temperature === 'solve' ? 1 : 0, phase)}}
dust:
  - name: disk
    opacity: grains
    shape: {kind: disk, inner: 5 au, outer: 200 au, surface-slope: -1, scale-height: {value: 8 au, at: 100 au, flaring: 1.2}}
    amount: {optical-depth: ${depth}, at: 1 um}
    temperature: ${temperature}
${grid ? `grid: {kind: spherical, radial: ${grid[0]}, polar: ${grid[1]}, azimuthal: ${grid[2]}}` : ''}
${cubes ? cubesOf(cubes, 16) : ''}
effort: ${effortOf(effort)}
${
  wavelengths
    ? `spectra: [{name: sed, view: {inclination: ${inclinations[0]} deg}, wavelengths: ${wavelengths > 1 ? `{from: 0.4 um, to: 2 mm, count: ${wavelengths}}` : '[1 um]'}}]`
    : `cameras:\n${inclinations.map(camera).join('\n')}`
}
`
}

/** An envelope of moderate depth about a star whose temperature is solved, in as many cubes as are allowed. */
export function cubesScene(cubes: number): string {
  return `title: Bench cubes
distance: 140 pc
seed: bench
sources: [{name: star, temperature: 4500 K, luminosity: 2 Lsun}]
opacities: {grains: ${dustOf(1)}}
dust:
  - name: envelope
    opacity: grains
    shape: {kind: shell, inner: 5 au, outer: 1000 au, slope: -1.5}
    amount: {optical-depth: 2, at: 1 um}
${cubesOf(cubes, 20)}
effort: ${effortOf({ precision: '1e-9' })}
cameras:
  - {name: c0, view: {inclination: 57 deg}, field: 2100 au, pixels: ${PIXELS}, wavelengths: [1 um], unit: erg/s/cm2/Hz/sr}
`
}

/**
 * The dusty envelope of Ivezic, Groenewegen, Men'shchikov & Szczerba (1997, MNRAS 291, 121), density r^-2, for its temperatures
 * alone: a star of 2500 K, absorption 1 below 1 um and 1/lambda above, scattering 1 and 1/lambda^4, isotropic. Needs ENVELOPE_DUST.
 */
export function envelopeScene(depth: number, precision: string): string {
  return `title: Bench envelope
distance: 1 kpc
seed: bench
sources: [{name: star, temperature: 2500 K, luminosity: 1e4 Lsun}]
opacities: {grains: {law: table, file: ${ENVELOPE_DUST.file}, phase: isotropic}}
dust:
  - name: envelope
    opacity: grains
    shape: {kind: shell, inner: 22 au, outer: {times-inner: 1000}, slope: -2}
    amount: {optical-depth: ${depth}, at: 1 um}
effort: {precision: ${precision}, equilibrium: 1e9}
`
}

export const ENVELOPE_DUST = {
  file: 'envelope-dust.csv',
  text: `wavelength [um],absorption [cm2/g],scattering [cm2/g]
0.01,1,1
1,1,1
10,0.1,1e-4
100,0.01,1e-8
1e4,1e-4,1e-16
`
}
