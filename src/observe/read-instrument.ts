import { basename, extname } from 'node:path'
import { z } from 'zod'
import { byPlace } from '../scene/by-place.js'
import { DataFiles } from '../scene/data-files.js'
import { SceneError } from '../scene/error.js'
import { issueProblems, locateProblem } from '../scene/issue-problems.js'
import { largestSceneFile } from '../scene/limits.js'
import { readText } from '../scene/read-text.js'
import { sha256 } from '../scene/sha256.js'
import { wording } from '../scene/wording.js'
import { YamlDocument } from '../scene/yaml-document.js'
import { parseKernel } from './kernel.js'
import { instrumentSchema, type ObservationEntry } from './schema/instrument-schema.js'
import { parseBaselines, parseResponse } from './tables.js'
import type { BeamSpec, Instrument, LightSpec, ObservationSpec, PictureNoise } from './types.js'
import { fluxOf } from './unit.js'

/** Reads an instrument file. Throws a SceneError that lists every problem found in it and in the data files it names. */
export function readInstrument(file: string, overrides: { seed?: string } = {}): Instrument {
  const content = readText(file, largestSceneFile)
  if ('reason' in content)
    throw new SceneError([{ location: { file, line: 1, column: 1 }, key: '', message: `the instrument file ${content.reason}` }])
  const document = new YamlDocument(content.text, file)
  const result = instrumentSchema.safeParse(document.value, { error: wording, reportInput: true })
  const files = new DataFiles(file, document)
  const problems = issueProblems(result.error?.issues ?? [], document)
  const entries = result.data?.observations ?? []
  entries.forEach(({ name }, i) => {
    if (entries.findIndex((other) => other.name.toLowerCase() === name.toLowerCase()) < i)
      problems.push(
        locateProblem(document, ['observations', i, 'name'], 'the name is used twice; names must differ in more than capitals')
      )
  })
  const observations = entries.map((entry, i) => resolved(entry, ['observations', i], files))
  problems.push(...files.problems)
  if (!result.success || problems.length > 0) throw new SceneError(problems.sort(byPlace(file)))
  return {
    file,
    text: content.text,
    title: result.data.title ?? basename(file, extname(file)),
    seed: overrides.seed ?? result.data.seed,
    observations: observations.filter((spec) => spec !== undefined),
    inputs: [{ file, sha256: sha256(content.text) }, ...files.inputs],
    problemAt: (path, message) => locateProblem(document, path, message)
  }
}

/** JSON Schema (draft 2020-12) of an instrument file. */
export function instrumentJsonSchema(): Record<string, unknown> {
  return { ...z.toJSONSchema(instrumentSchema, { io: 'input', target: 'draft-2020-12' }), title: 'Motelight instrument' }
}

type Path = (string | number)[]

/** An entry with its files read; undefined where one cannot be used. */
function resolved(entry: ObservationEntry, path: Path, files: DataFiles): ObservationSpec | undefined {
  const light = lightOf(entry, path, files)
  const zero = entry['zero-magnitude']
  const base = { name: entry.name, unit: entry.unit, ...(zero && { zeroMagnitude: fluxOf(zero, 1) }) }
  switch (entry.kind) {
    case 'photometry':
      return light && { ...base, light, kind: 'photometry', spectrum: entry.spectrum, ...(entry.noise && { noise: entry.noise }) }
    case 'visibilities': {
      const baselines =
        typeof entry.baselines === 'string'
          ? files.read(entry.baselines, [...path, 'baselines'], parseBaselines)
          : entry.baselines
      const noise = entry.noise && { noise: entry.noise }
      return light && baselines && { ...base, light, kind: 'visibilities', camera: entry.camera, baselines, ...noise }
    }
    case 'picture': {
      const beam = entry.beam && beamOf(entry.beam, [...path, 'beam'], files)
      if (!light || (entry.beam && !beam)) return undefined
      const pixel = typeof entry.pixel === 'number' ? ([entry.pixel, entry.pixel] as [number, number]) : entry.pixel
      return {
        ...base,
        light,
        kind: 'picture',
        camera: entry.camera,
        ...(beam && { beam }),
        ...(pixel && { pixel }),
        ...(entry.core && { core: entry.core }),
        ...(entry.background && { background: entry.background }),
        ...(entry.noise && { noise: noiseOf(entry.noise) })
      }
    }
  }
}

/** The light that an entry names, with the response of its band read. */
export function lightOf(
  { wavelength, band }: Pick<ObservationEntry, 'wavelength' | 'band'>,
  path: Path,
  files: DataFiles
): LightSpec | undefined {
  if (wavelength !== undefined) return { kind: 'line', wavelength }
  if (!band) return undefined
  const { weighting } = band
  if ('ends' in band)
    return { kind: 'band', wavelength: Float64Array.from(band.ends), response: new Float64Array([1, 1]), weighting }
  const table = files.read(band.response, [...path, 'band', 'response'], parseResponse)
  return table && { kind: 'band', ...table, weighting }
}

type PictureEntry = Extract<ObservationEntry, { kind: 'picture' }>

/** The beam that an entry names, with its kernel read. */
export function beamOf(beam: NonNullable<PictureEntry['beam']>, path: Path, files: DataFiles): BeamSpec | undefined {
  switch (beam.kind) {
    case 'gaussian':
      return { kind: beam.kind, major: beam.major, minor: beam.minor ?? beam.major, positionAngle: beam['position-angle'] }
    case 'airy':
      return beam
    case 'kernel': {
      const kernel = files.readField(beam.file, [...path, 'file'], parseKernel)
      return kernel && { kind: beam.kind, kernel }
    }
  }
}

function noiseOf(noise: NonNullable<PictureEntry['noise']>): PictureNoise {
  if (noise.kind === 'rms') return noise
  return { kind: noise.kind, time: noise.time, zeroPoint: noise['zero-point'], readNoise: noise['read-noise'] }
}
