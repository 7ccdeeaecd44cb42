import { errorAt } from '../scene/error.js'
import { isFromPlace } from '../scene/is-from-place.js'
import type { Scene } from '../scene/types.js'

/** How scattered light is estimated. */
export type Estimator = 'emissivity' | 'peel' | 'exit'

/** Throws a SceneError where the scene has cameras that an estimator does not know. */
export function requireEstimator(scene: Scene, estimator: Estimator): void {
  const i = scene.cameras.findIndex(({ view }) => isFromPlace(view))
  if (i >= 0 && estimator !== 'emissivity')
    throw errorAt(
      scene,
      ['cameras', i, 'view', 'from'],
      `the estimator ${estimator} knows only observers far away; leave --estimator out`
    )
}
