import type { SceneProblem } from './error.js'

/** The order in which problems are told: the main file first, then data files, each from top to bottom. */
export function byPlace(mainFile: string) {
  const rank = (problem: SceneProblem) => (problem.location.file === mainFile ? 0 : 1)
  return (a: SceneProblem, b: SceneProblem) =>
    rank(a) - rank(b) ||
    a.location.file.localeCompare(b.location.file) ||
    a.location.line - b.location.line ||
    a.location.column - b.location.column
}
