import { changedInputs } from './changed-inputs.js'
import { resultWarnings } from './result-warnings.js'
import type { RunResult } from './run-result.js'
import { sceneWarnings } from './scene-warnings.js'

/** All that the user should know before trusting a result: about the scene, the result, and the files it was made from. */
export function warningsOf(result: RunResult): string[] {
  const { model } = result
  return [...sceneWarnings(model), ...resultWarnings(result), ...changedInputs(model.scene.inputs)]
}
