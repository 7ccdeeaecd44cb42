import { rebuildModel } from '../model/build-model.js'
import { soughtRadii, withInnerRadii } from '../model/inner-radii.js'
import type { Model } from '../model/model.js'
import { dustLight } from '../solve/dust-light.js'
import { type DustTemperatures, givenTemperatures } from '../solve/dust-temperatures.js'
import { type EquilibriumResult, needsEquilibrium, solveEquilibrium } from '../solve/equilibrium.js'
import { equilibriumSetup } from '../solve/equilibrium-medium.js'
import { type EquilibriumProgress, equilibriumPiece } from '../solve/equilibrium-round.js'
import { type InnerRadii, radiiPiece, solveInnerRadii } from '../solve/inner-radius.js'
import type { StarColumns } from '../solve/star-columns.js'
import { type Sublimation, sublimate, sublimationPiece, withoutDust } from '../solve/sublimation.js'
import type { WorkerPool } from '../workers/pool.js'
import { HEAT_SHARE } from './error-shares.js'
import { type RunProgress, Stopped } from './progress.js'
import { quickErrors } from './quick-error.js'
import { type PhaseTime, stopwatch } from './stopwatch.js'
import { emptyProducts } from './wanted.js'
import type { Crew } from './with-crew.js'

/** Under this name the ledger holds temperatures that are done. */
export const dustPiece = 'dust'

/** Dust temperatures and how they were found. */
export interface DustStage {
  dust: DustTemperatures
  /** Absent when no temperature had to be solved for. */
  equilibrium?: Omit<EquilibriumResult, 'dust'>
  /** Absent when none was sought. */
  innerRadii?: InnerRadii
  /** Absent when no dust may sublimate. */
  sublimation?: Sublimation
  time: PhaseTime
}

/**
 * Temperatures from the ledger, or found and kept there, with the model that they belong to: inner radii that were sought have been
 * found, and dust that is too hot is gone. Throws SceneError, WorkerFailure or Stopped.
 */
export async function dustStage(
  { model, pool, ledger, columnsToStars }: Crew,
  onProgress: (progress: RunProgress) => void,
  stop?: AbortSignal
): Promise<DustStage & { model: Model }> {
  const clock = stopwatch()
  if (!needsEquilibrium(model.scene)) return { model, dust: givenTemperatures(model), time: clock() }
  const before = ledger.take(dustPiece) as DustStage | undefined
  const sweep = () => {
    for (const name of [equilibriumPiece, radiiPiece, sublimationPiece]) ledger.forget(name)
  }
  if (before) {
    sweep()
    return { ...before, model: fitted(model, before) }
  }
  const show = (at: EquilibriumProgress) => onProgress({ stage: 'dust', of: at.packets, ...at })
  const fit: DustFit = {}
  if (soughtRadii(model.scene).length > 0) fit.innerRadii = unlessStopped(await solveInnerRadii(model, pool, ledger, show, stop))
  if (model.scene.dust.some(({ sublimation }) => sublimation !== undefined))
    fit.sublimation = unlessStopped(await sublimate(fitted(model, fit), pool, ledger, show, stop))
  const last = fitted(model, fit)
  const found = await solveEquilibrium(
    last,
    equilibriumSetup(last),
    pool,
    ledger,
    async (dust) => errorOfEmission(last, dust, await columnsToStars(last), pool),
    show,
    stop
  )
  const { dust, ...equilibrium } = unlessStopped(found)
  const stage = { dust, equilibrium, ...fit, time: clock() }
  ledger.keep(dustPiece, stage)
  sweep()
  return { ...stage, model: last }
}

function unlessStopped<Result>(result: Result | 'stopped'): Result {
  if (result === 'stopped') throw new Stopped()
  return result
}

/** What of the dust depends on its temperature. */
type DustFit = Pick<DustStage, 'innerRadii' | 'sublimation'>

/** The model with the inner radii that were found, without the dust that is gone. */
function fitted(model: Model, { innerRadii, sublimation }: DustFit): Model {
  const moved = innerRadii ? rebuildModel(model, withInnerRadii(model.scene, innerRadii.found)) : model
  return sublimation ? withoutDust(moved, sublimation.gone) : moved
}

/** So many wavelengths of the cameras, and of the spectra, are looked at to see how the noise of the temperatures shows. */
const LOOKS = 8

/** Largest relative error that the noise of the temperatures makes in what will be seen. */
async function errorOfEmission(model: Model, dust: DustTemperatures, columns: StarColumns[], pool: WorkerPool): Promise<number> {
  const { wantedAt } = emptyProducts(model.scene, 'emissivity')
  const { cameras, spectra } = model.scene
  const wavelengths = new Set([...spread(cameras), ...spread(spectra)])
  const errors = Array.from(wavelengths, (wavelength) => {
    const wanted = wantedAt(wavelength)
    const indices = wanted.map(() => 0)
    return quickErrors(model, dustLight(model, dust, wavelength, columns), [], wanted, indices, 'all', pool)
  })
  return Math.max(0, ...(await Promise.all(errors)).flat()) / HEAT_SHARE
}

/** At most LOOKS of all wavelengths, spread evenly over the list. */
function spread(observers: { wavelengths: number[] }[]): number[] {
  const all = [...new Set(observers.flatMap(({ wavelengths }) => wavelengths))].sort((a, b) => a - b)
  const looks = Math.min(LOOKS, all.length)
  return Array.from({ length: looks }, (_, i) => all[Math.floor(((i + 0.5) * all.length) / looks)])
}
