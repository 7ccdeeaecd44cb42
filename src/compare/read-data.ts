import { basename, extname } from 'node:path'
import { z } from 'zod'
import { firstImage, parseFits } from '../data/fits/read.js'
import { parseTable } from '../data/table.js'
import { beamOf, lightOf } from '../observe/read-instrument.js'
import type { LightSpec } from '../observe/types.js'
import { fluxOf } from '../observe/unit.js'
import { byPlace } from '../scene/by-place.js'
import { DataFiles } from '../scene/data-files.js'
import { SceneError } from '../scene/error.js'
import { issueProblems, locateProblem } from '../scene/issue-problems.js'
import { largestSceneFile } from '../scene/limits.js'
import { readText } from '../scene/read-text.js'
import { sha256 } from '../scene/sha256.js'
import { wording } from '../scene/wording.js'
import { YamlDocument } from '../scene/yaml-document.js'
import { DEGREE } from '../units/angles.js'
import { errorsIn, type MeasuredPicture, parsePicture, planeLike, soundErrors } from './measured-picture.js'
import { type DataEntry, dataSchema } from './schema/data-schema.js'
import type { MeasuredSpec, Measurements } from './types.js'

/** Reads a file of data. Throws a SceneError that lists every problem found in it and in the files it names. */
export function readData(file: string): Measurements {
  const content = readText(file, largestSceneFile)
  if ('reason' in content)
    throw new SceneError([{ location: { file, line: 1, column: 1 }, key: '', message: `the file of data ${content.reason}` }])
  const document = new YamlDocument(content.text, file)
  const result = dataSchema.safeParse(document.value, { error: wording, reportInput: true })
  const files = new DataFiles(file, document)
  const problems = issueProblems(result.error?.issues ?? [], document)
  const entries = result.data?.data ?? []
  entries.forEach(({ name }, i) => {
    if (entries.findIndex((other) => other.name.toLowerCase() === name.toLowerCase()) < i)
      problems.push(
        locateProblem(document, ['data', i, 'name'], 'the name is used twice; names must differ in more than capitals')
      )
  })
  const sets = entries.map((entry, i) => resolved(entry, ['data', i], files))
  problems.push(...files.problems)
  if (!result.success || problems.length > 0) throw new SceneError(problems.sort(byPlace(file)))
  return {
    file,
    text: content.text,
    title: result.data.title ?? basename(file, extname(file)),
    free: result.data.free,
    sets: sets.filter((spec) => spec !== undefined),
    inputs: [{ file, sha256: sha256(content.text) }, ...files.inputs],
    problemAt: (path, message) => locateProblem(document, path, message)
  }
}

/** JSON Schema (draft 2020-12) of a file of data. */
export function dataJsonSchema(): Record<string, unknown> {
  return { ...z.toJSONSchema(dataSchema, { io: 'input', target: 'draft-2020-12' }), title: 'Motelight data' }
}

type Path = (string | number)[]

/** An entry with its files read; undefined where one cannot be used. */
function resolved(entry: DataEntry, path: Path, files: DataFiles): MeasuredSpec | undefined {
  const zero = entry.kind === 'photometry' || 'zero-magnitude' in entry ? entry['zero-magnitude'] : undefined
  const common = { name: entry.name, ...(entry.free && { free: entry.free }), ...(zero && { zeroMagnitude: fluxOf(zero, 1) }) }
  if (entry.kind === 'picture') return pictureOf(entry, common, path, files)
  const table = files.read(entry.file, [...path, 'file'], parseTable)
  const base = { ...common, errors: entry.errors }
  if (entry.kind === 'photometry') {
    const bands = new Map<string, LightSpec>()
    for (const [name, band] of Object.entries(entry.bands ?? {})) {
      const light = lightOf({ band }, [...path, 'bands', name], files)
      if (light) bands.set(name, light)
    }
    return table && { ...base, kind: 'photometry', spectrum: entry.spectrum, table, bands }
  }
  const light = lightOf(entry, path, files)
  if (entry.kind === 'visibilities')
    return table && light && { ...base, kind: 'visibilities', camera: entry.camera, light, table }
  const beam = entry.beam && beamOf(entry.beam, [...path, 'beam'], files)
  if (!table || !light || (entry.beam && !beam)) return undefined
  return {
    ...base,
    kind: 'profile',
    camera: entry.camera,
    light,
    table,
    along: entry.along,
    ...(beam && { beam }),
    ...(entry.core && { core: entry.core }),
    ...(entry.between && { between: entry.between })
  }
}

type PictureEntry = Extract<DataEntry, { kind: 'picture' }>

function pictureOf(entry: PictureEntry, common: { name: string }, path: Path, files: DataFiles): MeasuredSpec | undefined {
  const { errors, centre } = entry
  const picture = files.readField(entry.file, [...path, 'file'], (bytes, file) => {
    const measured = parsePicture(bytes, file)
    return 'extension' in errors ? { ...measured, errors: errorsIn(measured, errors.extension) } : measured
  })
  if (!picture) return undefined
  const alike = (name: string, key: Path) =>
    files.readField(name, [...path, ...key], (bytes, file) => planeLike(firstImage(parseFits(bytes, file)), picture))
  const sigma =
    'file' in errors
      ? files.readField(errors.file, [...path, 'errors', 'file'], (bytes, file) =>
          soundErrors(planeLike(firstImage(parseFits(bytes, file)), picture), file, picture.width)
        )
      : picture.errors
  const mask = entry.mask === undefined ? undefined : alike(entry.mask, ['mask'])
  const light = lightOf(entry, path, files)
  const beam = entry.beam ? beamOf(entry.beam, [...path, 'beam'], files) : picture.beam
  const measured: MeasuredPicture = {
    ...picture,
    ...(sigma && { errors: sigma }),
    ...('level' in errors && { level: errors.level }),
    ...(mask && { mask })
  }
  if (!light || (entry.beam && !beam)) return undefined
  return {
    ...common,
    kind: 'picture',
    camera: entry.camera,
    light,
    picture: measured,
    perBeam: errors.per === 'beam',
    ...(beam && { beam }),
    ...(entry.core && { core: entry.core }),
    ...(centre && { centre: { raDeg: centre.ra / DEGREE, decDeg: centre.dec / DEGREE } })
  }
}
