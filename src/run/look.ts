import type { PixelFrame } from '../camera/frame.js'
import { type FieldData, fieldData, openField } from '../camera/ray-field.js'
import type { RayMedium } from '../camera/ray-medium.js'
import type { View } from '../camera/sight.js'
import { type Survey, survey, surveyAperture, surveyBeyond } from '../camera/survey.js'
import { dimensionsOf } from '../grid/cells.js'
import type { WorkerPool } from '../workers/pool.js'

/** What threads do of quick looks, by name. */
export const looks = {
  profile: ({ medium, view, accuracy }: { medium: RayMedium; view: View; accuracy: number }) => fieldData(medium, view, accuracy),
  survey: ({ field, frame }: { field: FieldData; frame: PixelFrame }) => survey(openField(field), frame),
  'survey-aperture': ({ field, radius }: { field: FieldData; radius: number }) => surveyAperture(openField(field), radius),
  'survey-beyond': ({ field, frame }: { field: FieldData; frame: PixelFrame }) => surveyBeyond(openField(field), frame)
}

/** The intensity towards an observer, its rays traced on a thread where they are traced beforehand. */
export async function fieldOn(pool: WorkerPool, medium: RayMedium, view: View, accuracy: number): Promise<FieldData> {
  if (dimensionsOf(medium.walls) > 1) return fieldData(medium, view, accuracy)
  return (await pool.ask({ name: 'profile', input: { medium, view, accuracy } })) as FieldData
}

/** `survey` on a thread. */
export async function surveyOn(pool: WorkerPool, field: FieldData, frame: PixelFrame): Promise<Survey> {
  return (await pool.ask({ name: 'survey', input: { field, frame } })) as Survey
}

/** `surveyAperture` on a thread. */
export async function surveyApertureOn(pool: WorkerPool, field: FieldData, radius: number): Promise<Float64Array> {
  return (await pool.ask({ name: 'survey-aperture', input: { field, radius } })) as Float64Array
}

/** `surveyBeyond` on a thread. */
export async function surveyBeyondOn(pool: WorkerPool, field: FieldData, frame: PixelFrame): Promise<number> {
  return (await pool.ask({ name: 'survey-beyond', input: { field, frame } })) as number
}
