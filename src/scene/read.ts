import { basename, extname } from 'node:path'
import { byPlace } from './by-place.js'
import { DataFiles } from './data-files.js'
import { parseDensityPoints } from './density-points.js'
import { SceneError, type SceneProblem } from './error.js'
import { parseDensityCube } from './fits-cube.js'
import { issueProblems, locateProblem } from './issue-problems.js'
import { linkProblems } from './link-problems.js'
import { readUserFile } from './list-file.js'
import { resolveCamera, resolveSpectrum } from './observers.js'
import { opacitySpec } from './opacities.js'
import { type SoundParts, soundParts } from './parts.js'
import { placeProblems } from './place-problems.js'
import { sceneSchema } from './schema/scene-schema.js'
import { sha256 } from './sha256.js'
import { parseIntensityTable, parseSpectrumTable } from './tables.js'
import type { AmbientSpec, DustSpec, OpacitySpec, Scene, ScenePath, ShapeSpec, SourceSpec } from './types.js'
import { wording } from './wording.js'
import { YamlDocument } from './yaml-document.js'

/** Reads a scene file. Throws a SceneError that lists every problem found in it and in the data files it names. */
export function readScene(file: string, overrides: { seed?: string } = {}): Scene {
  const text = readUserFile(file, 'scene file')
  const scene = parseScene(text, file)
  return { ...scene, seed: overrides.seed ?? scene.seed }
}

/** The scene in a text; `file` is its name, and data files are relative to its folder. Throws a SceneError. */
export function parseScene(text: string, file: string): Scene {
  const document = new YamlDocument(text, file)
  const result = sceneSchema.safeParse(document.value, { error: wording, reportInput: true })
  const parts = soundParts(document.value)
  const files = new DataFiles(file, document)
  const sources = parts.sources.map((entry, i) => entry && sourceSpec(entry, i, files))
  const opacities = [...parts.opacities].map(([name, entry]) => [name, entry && opacitySpec(entry, name, files)] as const)
  const dust = parts.dust.map((entry, i) => entry && dustSpec(entry, i, files))
  const { cameras, spectra, problems } = observers(parts, document)
  problems.push(...issueProblems(result.error?.issues ?? [], document), ...linkProblems(document), ...files.problems)
  if (!result.success || problems.length > 0) throw new SceneError(problems.sort(byPlace(file)))
  const { title = basename(file, extname(file)), distance, sky, seed, grid, effort } = result.data
  const scene: Scene = {
    file,
    title,
    distance,
    ...(sky && { sky }),
    seed,
    sources: sources.filter((source) => source !== undefined),
    opacities: Object.fromEntries(opacities) as Record<string, OpacitySpec>,
    dust: dust.filter((component) => component !== undefined),
    grid,
    effort,
    cameras,
    spectra,
    inputs: [{ file, sha256: sha256(text) }, ...files.inputs],
    locate: (path) => document.locate(path)
  }
  const misplaced = placeProblems(scene).map(({ path, problem }) => locateProblem(document, path, problem))
  if (misplaced.length > 0) throw new SceneError(misplaced)
  return scene
}

type Sound<Key extends 'sources' | 'dust' | 'cameras' | 'spectra'> = NonNullable<SoundParts[Key][number]>

function sourceSpec(source: Sound<'sources'>, i: number, files: DataFiles): SourceSpec | undefined {
  if (source.kind === 'ambient') return ambientSpec(source, i, files)
  const { spectrumFile, ...star } = source
  if (spectrumFile === undefined) return { ...star, spectrum: { kind: 'blackbody' } }
  const table = files.read(spectrumFile, ['sources', i, 'spectrum', 'table'], parseSpectrumTable)
  return table && { ...star, spectrum: { kind: 'table', table } }
}

function ambientSpec(
  { name, kind, spectrum, strength }: Extract<Sound<'sources'>, { kind: 'ambient' }>,
  i: number,
  files: DataFiles
): AmbientSpec | undefined {
  if (spectrum === 'interstellar') return { name, kind, spectrum: { kind: spectrum }, strength }
  if ('table' in spectrum) {
    const table = files.read(spectrum.table, ['sources', i, 'spectrum', 'table'], parseIntensityTable)
    return table && { name, kind, spectrum: { kind: 'table', table }, strength }
  }
  const terms = [spectrum].flat().map(({ blackbody, dilution }) => ({ temperature: blackbody, dilution }))
  return { name, kind, spectrum: { kind: 'blackbodies', terms }, strength }
}

function dustSpec({ shape, ...component }: Sound<'dust'>, i: number, files: DataFiles): DustSpec | undefined {
  if (shape.kind !== 'field') return { ...component, shape }
  const { file, ...field } = shape
  const path = ['dust', i, 'shape', 'file']
  const data = /\.csv$/i.test(file)
    ? files.read<FieldData>(file, path, parseDensityPoints)
    : files.readField<FieldData>(file, path, parseDensityCube)
  return data && { ...component, shape: { ...field, data } }
}

type FieldData = Extract<ShapeSpec, { kind: 'field' }>['data']

/** Cameras and spectra as seen from the scene's distance; none while that is unknown. */
function observers({ distance, cameras, spectra }: SoundParts, document: YamlDocument) {
  const problems: SceneProblem[] = []
  function resolved<Entry, Spec extends object>(
    section: string,
    entries: (Entry | undefined)[],
    resolve: (entry: Entry, distance: number) => Spec | { path: ScenePath; problem: string }
  ): Spec[] {
    return entries.flatMap((entry, i) => {
      if (entry === undefined || distance === undefined) return []
      const spec = resolve(entry, distance)
      if (!('problem' in spec)) return [spec as Spec]
      problems.push(locateProblem(document, [section, i, ...spec.path], spec.problem))
      return []
    })
  }
  return {
    cameras: resolved('cameras', cameras, resolveCamera),
    spectra: resolved('spectra', spectra, resolveSpectrum),
    problems
  }
}
