import type { ScenePath, SourceLocation } from '../../scene/types.js'
import type { YamlDocument } from '../../scene/yaml-document.js'
import type { Parameter, Sweep } from '../types.js'
import type { Value } from './value.js'

/** What is at hand while a plan is read. */
export interface PlanDesk {
  /** The base scene as written. */
  base: Record<string, unknown>
  document: YamlDocument
  report: (path: ScenePath, message: string) => void
}

/** What varies, and how; `locate` tells where a value of a model (numbered from 1) was written. */
export interface Varied {
  parameters: Parameter[]
  models: Value[][]
  locate: (parameter: number, model: number, models: Value[][]) => SourceLocation
}

/** The models of a plan, ties included. */
export type PlannedModels = Varied & Pick<Sweep, 'design'>
