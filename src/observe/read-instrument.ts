import { z } from 'zod'
import type { DataFiles } from '../scene/data-files.js'
import { parseListFile, readUserFile } from '../scene/list-file.js'
import type { ScenePath } from '../scene/types.js'
import { parseKernel } from './kernel.js'
import { instrumentSchema, type ObservationEntry } from './schema/instrument-schema.js'
import { parseBaselines, parseResponse } from './tables.js'
import type { BeamSpec, Instrument, LightSpec, ObservationSpec, PictureNoise } from './types.js'
import { fluxOf } from './unit.js'

/** Reads an instrument file. Throws a SceneError that lists every problem found in it and in the data files it names. */
export function readInstrument(file: string, overrides: { seed?: string } = {}): Instrument {
  return parseInstrument(readUserFile(file, 'instrument file'), file, overrides)
}

/** The same of its text. */
export function parseInstrument(text: string, file: string, overrides: { seed?: string } = {}): Instrument {
  const { content, specs, ...list } = parseListFile(text, file, instrumentSchema, 'observations', resolved)
  return { ...list, seed: overrides.seed ?? content.seed, observations: specs }
}

/** JSON Schema (draft 2020-12) of an instrument file. */
export function instrumentJsonSchema(): Record<string, unknown> {
  return { ...z.toJSONSchema(instrumentSchema, { io: 'input', target: 'draft-2020-12' }), title: 'Motelight instrument' }
}

/** An entry with its files read; undefined where one cannot be used. */
function resolved(entry: ObservationEntry, path: ScenePath, files: DataFiles): ObservationSpec | undefined {
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
  path: ScenePath,
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
export function beamOf(beam: NonNullable<PictureEntry['beam']>, path: ScenePath, files: DataFiles): BeamSpec | undefined {
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
