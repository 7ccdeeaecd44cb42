import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import type { WorkerPool } from '../workers/pool.js'
import { emissivityJob } from './emissivity-job.js'
import type { Estimator } from './estimator.js'
import type { LightJob } from './light-job.js'
import { packetJob } from './packet-job.js'
import type { Wanted } from './wanted.js'

export function makeLightJob(model: Model, light: DustLight, estimator: Estimator, wanted: Wanted[], pool: WorkerPool): LightJob {
  return estimator === 'emissivity' ? emissivityJob(model, light, wanted, pool) : packetJob(model, light, estimator, wanted)
}
