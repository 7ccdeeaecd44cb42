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
  /** False when every trial was cut short: the times mean nothing then. */
  complete: boolean
}

const TRIAL_SECONDS = 8

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
  const whole = forecasts.filter(({ complete }) => complete)
  const used = whole.length > 0 ? whole : forecasts
  const mean = (of: (seconds: Forecast['seconds']) => number) =>
    used.reduce((sum, { seconds }) => sum + of(seconds), 0) / used.length
  const leads = new Set(dustLeads(sweep)).size
  const all = leads * mean(({ dust }) => dust) + count * mean(({ light, pictures }) => light + pictures)
  return {
    secondsAModel: mean((seconds) => seconds.all),
    seconds: all / Math.min(cores, count),
    cores,
    tried,
    complete: whole.length > 0
  }
}
