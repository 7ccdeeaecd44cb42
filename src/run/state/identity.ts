import { version } from '../../output/version.js'
import type { InputFile, Scene } from '../../scene/types.js'
import type { Estimator } from '../estimator.js'

/** What decides every bit of a result: work kept by one process serves another only when all of it is the same. */
export interface Identity {
  version: string
  seed: string
  inputs: InputFile[]
  /** Absent for dust temperatures, which do not depend on it. */
  estimator?: Estimator
}

export function identityOf({ seed, inputs }: Scene, estimator?: Estimator): Identity {
  return { version, seed, inputs, ...(estimator && { estimator }) }
}

/** What differs between the work kept and the run at hand, in words; undefined when nothing does. */
export function difference(kept: Identity, present: Identity): string | undefined {
  if (kept.version !== present.version) return `it was made by motelight ${kept.version}, this is ${present.version}`
  if (kept.seed !== present.seed) return `its seed was ${JSON.stringify(kept.seed)}, now it is ${JSON.stringify(present.seed)}`
  const changed = present.inputs.find(({ sha256 }, i) => sha256 !== kept.inputs[i]?.sha256)
  if (changed) return `${changed.file} has changed since`
  if (kept.inputs.length !== present.inputs.length) return 'its scene named other data files'
  if (kept.estimator !== present.estimator) return `its estimator was ${kept.estimator}, now it is ${present.estimator}`
  return undefined
}
