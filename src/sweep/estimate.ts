import { buildModel, planCells } from '../model/build-model.js'
import { type Forecast, forecast } from '../run/forecast.js'
import { grainTables } from '../run/grain-tables.js'
import { runTrial } from '../run/trial.js'
import { dustLeads } from './folder/dust-groups.js'
import { modelScene } from './plan/model-scene.js'
import type { Sweep } from './types.js'

/** What a sweep is expected to take; right to an order of magnitude. */
export interface Estimate {
  /** Of one model on one core. */
  secondsAModel: number
  /** Of the whole sweep on so many cores. */
  seconds: number
  cores: number
  /** Models tried. */
  tried: number[]
  /** False when a trial was cut short: it will take longer. */
  complete: boolean
}

const TRIAL_SECONDS = 4

/** Tries the first, the middle and the last model in small; `onTry` is told which is at hand. Throws SceneError. */
export async function estimateSweep(sweep: Sweep, cores: number, onTry: (model: number) => void = () => {}): Promise<Estimate> {
  const count = sweep.models.length
  const tried = [...new Set([1, Math.ceil(count / 2), count])]
  const forecasts: Forecast[] = []
  for (const number of tried) {
    onTry(number)
    const scene = modelScene(sweep, number)
    const tables = await grainTables(scene, cores)
    forecasts.push(forecast(buildModel(scene, planCells(scene, tables)), await runTrial(scene, tables, TRIAL_SECONDS), 1))
  }
  const mean = (of: (seconds: Forecast['seconds']) => number) =>
    forecasts.reduce((sum, { seconds }) => sum + of(seconds), 0) / forecasts.length
  const leads = new Set(dustLeads(sweep)).size
  const all = leads * mean(({ dust }) => dust) + count * mean(({ light, pictures }) => light + pictures)
  return {
    secondsAModel: mean((seconds) => seconds.all),
    seconds: all / Math.min(cores, count),
    cores,
    tried,
    complete: forecasts.every(({ complete }) => complete)
  }
}
