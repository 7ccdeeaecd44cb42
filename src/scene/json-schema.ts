import { z } from 'zod'
import { sceneSchema } from './schema/scene-schema.js'

/** JSON Schema (draft 2020-12) of a scene file, for completion and checking in editors. */
export function sceneJsonSchema(): Record<string, unknown> {
  return { ...z.toJSONSchema(sceneSchema, { io: 'input', target: 'draft-2020-12' }), title: 'Motelight scene' }
}
