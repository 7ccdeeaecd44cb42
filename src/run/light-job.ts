import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import type { GroupSums } from '../solve/group-sums.js'
import type { RoundsRequest } from '../solve/rounds.js'
import type { WorkerPool } from '../workers/pool.js'
import { emissivityJob } from './emissivity-job.js'
import type { Estimator } from './estimator.js'
import type { Studio } from './observe-wavelength.js'
import { packetJob } from './packet-job.js'
import type { Wanted } from './wanted.js'

/** The work at one wavelength: packets, and what is made of them. */
export interface LightJob {
  /** Absent where no packet is needed. */
  request?: RoundsRequest
  /** Writes everything wanted at the wavelength; false when it was stopped before the end. */
  develop: (sums: GroupSums | undefined, studio: Studio) => Promise<boolean>
}

export function lightJob(model: Model, light: DustLight, estimator: Estimator, wanted: Wanted[], pool: WorkerPool): LightJob {
  return estimator === 'emissivity' ? emissivityJob(model, light, wanted, pool) : packetJob(model, light, estimator, wanted)
}
