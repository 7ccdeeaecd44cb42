import { z } from 'zod'
import { firstImage, parseFits } from '../data/fits/read.js'
import { parseTable } from '../data/table.js'
import { beamOf, lightOf } from '../observe/read-instrument.js'
import type { LightSpec } from '../observe/types.js'
import { fluxOf } from '../observe/unit.js'
import type { DataFiles } from '../scene/data-files.js'
import { parseList, parseListFile, readUserFile } from '../scene/list-file.js'
import type { ScenePath } from '../scene/types.js'
import type { YamlDocument } from '../scene/yaml-document.js'
import { DEGREE } from '../units/angles.js'
import { errorsIn, type MeasuredPicture, parsePicture, planeLike, soundErrors } from './measured-picture.js'
import { type DataEntry, dataSchema } from './schema/data-schema.js'
import type { DataList, MeasuredSpec, Measurements } from './types.js'

/** Reads a file of data. Throws a SceneError that lists every problem found in it and in the files it names. */
export function readData(file: string): Measurements {
  const { content, specs, ...list } = parseListFile(readUserFile(file, 'file of data'), file, dataSchema, 'data', resolved)
  return { ...list, free: content.free, sets: specs }
}

/** The same of a value that stands in a document of another kind, such as a plan, with its list at the key `data`. */
export function parseData(value: unknown, document: YamlDocument, file: string): DataList {
  const { content, specs, inputs, problemAt } = parseList(value, document, file, dataSchema, 'data', resolved)
  return { free: content.free, sets: specs, inputs, problemAt }
}

/** JSON Schema (draft 2020-12) of a file of data. */
export function dataJsonSchema(): Record<string, unknown> {
  return { ...z.toJSONSchema(dataSchema, { io: 'input', target: 'draft-2020-12' }), title: 'Motelight data' }
}

/** An entry with its files read; undefined where one cannot be used. */
function resolved(entry: DataEntry, path: ScenePath, files: DataFiles): MeasuredSpec | undefined {
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

function pictureOf(entry: PictureEntry, common: { name: string }, path: ScenePath, files: DataFiles): MeasuredSpec | undefined {
  const { errors, centre } = entry
  const picture = files.readField(entry.file, [...path, 'file'], (bytes, file) => {
    const measured = parsePicture(bytes, file)
    return 'extension' in errors ? { ...measured, errors: errorsIn(measured, errors.extension) } : measured
  })
  if (!picture) return undefined
  const alike = (name: string, key: ScenePath) =>
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
