import { isOctree, reachOf } from '../grid/cells.js'
import { buildModel, planCells } from '../model/build-model.js'
import type { Model } from '../model/model.js'
import type { AmbientSpec, Scene } from '../scene/types.js'
import { inflow } from '../sources/ambient.js'
import { AU, PARSEC, SOLAR_LUMINOSITY, SOLAR_MASS, SOLAR_RADIUS } from '../units/constants.js'
import { type Forecast, forecast } from './forecast.js'
import { grainTables } from './grain-tables.js'
import { memoryEstimate, totalMemory } from './memory.js'
import { type OpticalDepths, opticalDepths } from './optical-depths.js'
import { percent } from './percent.js'
import { sceneWarnings } from './scene-warnings.js'
import { runTrial } from './trial.js'
import type { RunOptions } from './with-crew.js'

/** What a scene means, before it is run. */
export interface SceneCheck {
  title: string
  scene: string
  distancePc: number
  seed: string
  sources: {
    name: string
    extent: 'point' | 'sphere'
    spectrum: string
    temperatureK?: number
    luminosityLsun: number
    radiusRsun?: number
  }[]
  ambient: {
    name: string
    spectrum: string
    /** Intensity of all frequencies over all directions, 4 pi J, erg/s/cm2. */
    intensity: number
    /** What enters the outermost cell, Lsun. */
    inflowLsun: number
  }[]
  dust: {
    name: string
    opacity: string
    shape: string
    temperature: string | number
    innerAu: number
    /** The inner radius is only a first guess: it will be sought where the dust has this temperature. */
    innerSoughtK?: number
    /** Dust hotter than this will be removed. */
    sublimationK?: number
    outerAu: number
    massMsun: number
  }[]
  opticalDepths: OpticalDepths
  cells: { count: number; reason: string } & (
    | { radial: number; polar: number; azimuthal: number }
    /** Sides of the whole cube and of its smallest cells. */
    | { widthAu: number; finestAu: number }
  )
  memoryBytes: number
  workers: number
  precision: number | null
  forecast: Forecast
  warnings: string[]
}

/** Longest trial, s. */
const TRIAL_SECONDS = 8

/** Works out what a scene means, and tries a little of it to see how long all will take. Throws SceneError. */
export async function checkScene(
  scene: Scene,
  { workers, onProgress }: Pick<RunOptions, 'workers'> & Partial<Pick<RunOptions, 'onProgress'>>
): Promise<SceneCheck> {
  const tables = await grainTables(scene, workers, onProgress)
  const model = buildModel(scene, planCells(scene, tables))
  const trial = await runTrial(scene, tables, TRIAL_SECONDS)
  const expected = forecast(model, trial, workers)
  const { walls, cells, reason } = model
  return {
    title: scene.title,
    scene: scene.file,
    distancePc: scene.distance / PARSEC,
    seed: scene.seed,
    sources: model.stars.map(({ spec: { name, extent, spectrum, temperature, luminosity, radius } }) => ({
      name,
      extent,
      spectrum: spectrum.kind === 'table' ? spectrum.table.file : spectrum.kind,
      ...(temperature !== undefined && { temperatureK: temperature }),
      luminosityLsun: luminosity / SOLAR_LUMINOSITY,
      ...(radius !== undefined && { radiusRsun: radius / SOLAR_RADIUS })
    })),
    ambient: model.fields.map(({ spec, spectrum }) => ({
      name: spec.name,
      spectrum: ambientSpectrum(spec),
      intensity: 4 * Math.PI * spectrum.intensity,
      inflowLsun: inflow(spectrum, reachOf(walls)).luminosity / SOLAR_LUMINOSITY
    })),
    dust: model.components.map(({ spec, shape, mass }) => ({
      name: spec.name,
      opacity: spec.opacity,
      shape: spec.shape.kind,
      temperature: spec.temperature,
      innerAu: shape.innerRadius / AU,
      ...(spec.shape.sought && { innerSoughtK: spec.shape.sought.temperature }),
      ...(spec.sublimation !== undefined && { sublimationK: spec.sublimation }),
      outerAu: shape.outerRadius / AU,
      massMsun: mass / SOLAR_MASS
    })),
    opticalDepths: opticalDepths(model),
    cells: {
      count: cells,
      ...(isOctree(walls)
        ? { widthAu: walls.side / AU, finestAu: walls.smallestSide / AU }
        : { radial: walls.r.length - 1, polar: walls.cosTheta.length - 1, azimuthal: walls.phi.length - 1 }),
      reason
    },
    memoryBytes: totalMemory(memoryEstimate(model, workers), workers),
    workers,
    precision: scene.effort.precision,
    forecast: expected,
    warnings: [...sceneWarnings(model), ...doubts(model, expected)]
  }
}

function ambientSpectrum({ spectrum }: AmbientSpec): string {
  if (spectrum.kind === 'table') return spectrum.table.file
  if (spectrum.kind === 'interstellar') return spectrum.kind
  return `blackbody ${spectrum.terms.map(({ temperature }) => `${temperature} K`).join(', ')}`
}

function doubts({ scene }: Model, { packets, complete }: Forecast): string[] {
  const { precision } = scene.effort
  if (precision === null || !complete) return []
  const short = (what: string, key: string, { needed, most }: { needed: number; most: number }) =>
    needed > 1.5 * most
      ? [
          `effort: the precision of ${percent(precision)} is unlikely to be reached in ${what}: about ${needed.toPrecision(1)} packets would be needed, effort.${key} allows ${most}`
        ]
      : []
  return [
    ...short('the light of warm dust', 'equilibrium', packets.dust),
    ...short('scattered light, at some wavelengths', 'cameras', packets.light)
  ]
}
