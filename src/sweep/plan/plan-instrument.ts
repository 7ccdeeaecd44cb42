import { resolve } from 'node:path'
import { observeModel } from '../../observe/observe-run.js'
import { parseInstrument } from '../../observe/read-instrument.js'
import type { Scene } from '../../scene/types.js'
import type { YamlDocument } from '../../scene/yaml-document.js'
import { darkLight } from '../data/model-lights.js'
import { fingerprintOf } from '../data/sources.js'
import type { SweepInstrument } from '../types.js'
import { readNamed } from './read-named.js'

/** The instrument file of a plan; `check` throws a SceneError where models of a scene cannot be observed with it. */
export function readPlanInstrument(
  name: string,
  plan: string,
  document: YamlDocument
): { instrument: SweepInstrument; check: (scene: Scene) => void } {
  const { file, text } = readNamed(name, 'instrument file', ['observe'], plan, document)
  const instrument = parseInstrument(text, file)
  return {
    instrument: { file: resolve(file), text, fingerprint: fingerprintOf(instrument) },
    check: (model) => {
      observeModel(darkLight(model), instrument)
    }
  }
}
