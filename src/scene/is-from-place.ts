import type { CameraView, PlaceViewSpec } from './types.js'

/** Whether an observer stands at a place of the scene, not far away. */
export function isFromPlace(view: CameraView): view is PlaceViewSpec {
  return 'from' in view
}
