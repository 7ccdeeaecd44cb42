import type { Scene, ScenePath, SourceLocation } from './types.js'

/** Something the user can mend in a file: where it is, which key, what was given, what is accepted. */
export interface SceneProblem {
  location: SourceLocation
  /** Dotted path of the key, such as `dust.0.amount`; empty for the file as a whole. */
  key: string
  /** The value given, as text; absent for a missing key. */
  given?: string
  /** What is wrong and what is accepted. */
  message: string
}

/** Problems told in words; all are in `problems`. */
const MOST_TOLD = 50
/** Longest key or value, and longest message, in words. */
const SHORT = 80
const LONG = 1000

/** One or more problems in a scene or in a data file it names. Exit code 2. */
export class SceneError extends Error {
  constructor(readonly problems: SceneProblem[]) {
    const told = problems.slice(0, MOST_TOLD).map(describeProblem)
    const more = problems.length - told.length
    super([...told, ...(more > 0 ? [`and ${more} more problems`] : [])].join('\n'))
    this.name = 'SceneError'
  }
}

/** The error of one key of a scene that stands otherwise. */
export function errorAt({ locate }: Pick<Scene, 'locate'>, path: ScenePath, message: string, given?: string): SceneError {
  return new SceneError([{ location: locate(path), key: path.join('.'), ...(given !== undefined && { given }), message }])
}

function describeProblem({ location, key, given, message }: SceneProblem): string {
  const subject = [key, given]
    .filter((part) => part)
    .map((part) => shortened(part!, SHORT))
    .join(' = ')
  return `${location.file}:${location.line}:${location.column}: ${subject ? `${subject}: ` : ''}${shortened(message, LONG)}`
}

function shortened(text: string, most: number): string {
  return text.length > most ? `${text.slice(0, most - 3)}...` : text
}
