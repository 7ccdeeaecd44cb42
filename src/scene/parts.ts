import type { z } from 'zod'
import { isRecord } from './is-record.js'
import { dustSchema } from './schema/dust-schema.js'
import { cameraSchema, spectrumSchema } from './schema/observer-schema.js'
import { opacitySchema } from './schema/opacity-schema.js'
import { sceneSchema } from './schema/scene-schema.js'
import { sourceSchema } from './schema/source-schema.js'

/**
 * The parts of a scene that need more than the schema (files, the distance), where sound in themselves, so that they can be
 * checked although others are unsound; undefined in place of an unsound entry.
 */
export function soundParts(value: unknown) {
  const scene = isRecord(value) ? value : {}
  return {
    distance: sound(sceneSchema.shape.distance, scene.distance),
    sources: soundList(sourceSchema, scene.sources),
    opacities: new Map(
      Object.entries(isRecord(scene.opacities) ? scene.opacities : {}).map(([key, entry]) => [key, sound(opacitySchema, entry)])
    ),
    dust: soundList(dustSchema, scene.dust),
    cameras: soundList(cameraSchema, scene.cameras),
    spectra: soundList(spectrumSchema, scene.spectra)
  }
}

export type SoundParts = ReturnType<typeof soundParts>

function soundList<Schema extends z.ZodType>(schema: Schema, list: unknown) {
  return Array.isArray(list) ? list.map((entry) => sound(schema, entry)) : []
}

function sound<Schema extends z.ZodType>(schema: Schema, value: unknown): z.output<Schema> | undefined {
  const result = schema.safeParse(value)
  return result.success ? result.data : undefined
}
