import { closest } from './closest.js'
import { canonicalUnit } from './dimension.js'
import { fluxUnit, fluxUnits } from './flux.js'
import { intensityUnit, intensityUnits } from './intensity.js'
import { numeral } from './numeral.js'
import { solidAngleUnits } from './solid-angle.js'

/** What a conversion may depend on; each is absent until the user gives it. */
export interface Circumstances {
  wavelength?: { frequencyHz: number }
  beam?: { sr: number }
  pixel?: { sr: number }
}

type Circumstance = keyof Circumstances
type Kind = 'intensity' | 'flux' | 'solid angle'

/** A conversion that has no meaning, or not without what the user has not said. */
export class ConversionError extends Error {
  override name = 'ConversionError'
}

interface Known {
  frequencyHz: number
  beamSr: number
  pixelSr: number
}

interface AnyUnit {
  name: string
  kind: Kind
  toCgs: (value: number, known: Known) => number
  fromCgs: (value: number, known: Known) => number
}

const units: AnyUnit[] = [
  ...intensityUnits.map((name): AnyUnit => ({ ...intensityUnit(name), kind: 'intensity' })),
  ...fluxUnits.map((name): AnyUnit => ({ ...fluxUnit(name), kind: 'flux' })),
  ...Object.entries(solidAngleUnits).map(([name, size]) => solidAngle(name, () => size)),
  solidAngle('beam', ({ beamSr }) => beamSr),
  solidAngle('pixel', ({ pixelSr }) => pixelSr)
]

function solidAngle(name: string, size: (known: Known) => number): AnyUnit {
  return { name, kind: 'solid angle', toCgs: (value, known) => value * size(known), fromCgs: (sr, known) => sr / size(known) }
}

/** Names of every unit that `convert` knows. */
export const convertibleUnits: string[] = units.map((unit) => unit.name)

/**
 * Converts text such as `3.2 mJy/beam` into another unit of intensity, flux density or solid angle. Between an intensity and a
 * flux density stands the solid angle of the beam, or else of the pixel. Throws a ConversionError that says what is missing.
 */
export function convert(
  text: string,
  to: string,
  given: Circumstances
): { value: number; number: number; from: string; to: string } {
  const [, digits, name] = new RegExp(String.raw`^\s*(${numeral})\s*(.*?)\s*$`, 'su').exec(text) ?? []
  if (digits === undefined) throw new ConversionError(`\`${text}\` is not a number with a unit, such as \`3.2 mJy/beam\``)
  const source = unitOf(name)
  const target = unitOf(to)
  const number = Number(digits)
  const missing = neededBy(source, target, given)
  if (missing.length > 0) throw new ConversionError(missingText(source, target, missing))
  const value = through(number, source, target, knownOf(given), given)
  if (Number.isNaN(value)) throw new ConversionError(`${digits} ${source.name} has no value in ${target.name}: nothing shines`)
  return { value, number, from: source.name, to: target.name }
}

function unitOf(written: string): AnyUnit {
  const name = canonicalUnit(written.trim())
  const unit = units.find((candidate) => candidate.name === name)
  if (unit) return unit
  const meant = closest(name, convertibleUnits)
  const fault = name === '' ? 'the unit is missing' : `\`${written}\` is not a unit known here`
  throw new ConversionError(`${fault}${meant ? `; did you mean \`${meant}\`?` : ''}; accepted: ${convertibleUnits.join(', ')}`)
}

const probe: Known = { frequencyHz: 2.3e11, beamSr: 2.7e-11, pixelSr: 4.1e-12 }

function knownOf({ wavelength, beam, pixel }: Circumstances): Known {
  return {
    frequencyHz: wavelength?.frequencyHz ?? probe.frequencyHz,
    beamSr: beam?.sr ?? probe.beamSr,
    pixelSr: pixel?.sr ?? probe.pixelSr
  }
}

/** What is not given although the result depends on it: found by trying two values of it. */
function neededBy(source: AnyUnit, target: AnyUnit, given: Circumstances): Circumstance[] {
  if (source.kind !== target.kind && (source.kind === 'solid angle' || target.kind === 'solid angle'))
    throw new ConversionError(`${source.name} is a unit of ${source.kind}, ${target.name} of ${target.kind}: they do not convert`)
  const fields: [Circumstance, keyof Known][] = [
    ['wavelength', 'frequencyHz'],
    ['beam', 'beamSr'],
    ['pixel', 'pixelSr']
  ]
  const all: Circumstances = { beam: given.beam ?? (given.pixel ? undefined : { sr: probe.beamSr }), ...given }
  return fields
    .filter(([circumstance, field]) => {
      if (given[circumstance]) return false
      const at = (factor: number) => through(1, source, target, { ...knownOf(given), [field]: factor * probe[field] }, all)
      return Math.abs(at(1) / at(2) - 1) > 1e-12
    })
    .map(([circumstance]) => circumstance)
}

function through(number: number, source: AnyUnit, target: AnyUnit, known: Known, given: Circumstances): number {
  const cgs = source.toCgs(number, known)
  const sr = given.beam || !given.pixel ? known.beamSr : known.pixelSr
  const factor = source.kind === target.kind ? 1 : source.kind === 'intensity' ? sr : 1 / sr
  return target.fromCgs(cgs * factor, known)
}

const called: Record<Circumstance, string> = {
  wavelength: 'a wavelength (--wavelength 870um, or a frequency)',
  beam: 'a beam (--beam "0.3x0.2 arcsec", its full widths at half maximum)',
  pixel: 'a pixel (--pixel "0.05 arcsec", its side)'
}

function missingText(source: AnyUnit, target: AnyUnit, missing: Circumstance[]): string {
  const list = missing.map((circumstance) => {
    const either =
      circumstance === 'beam' && source.kind !== target.kind && ![source.name, target.name].some((name) => name.endsWith('beam'))
    return either ? `${called.beam} or ${called.pixel}` : called[circumstance]
  })
  return `${source.name} to ${target.name} is not defined without ${list.join(' and ')}`
}
