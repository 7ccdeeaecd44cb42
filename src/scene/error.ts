import type { SourceLocation } from './types.js'

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

/** One or more problems in a scene or in a data file it names. Exit code 2. */
export class SceneError extends Error {
  constructor(readonly problems: SceneProblem[]) {
    super(problems.map(describeProblem).join('\n'))
    this.name = 'SceneError'
  }
}

function describeProblem({ location, key, given, message }: SceneProblem): string {
  const subject = [key, given].filter((part) => part).join(' = ')
  return `${location.file}:${location.line}:${location.column}: ${subject ? `${subject}: ` : ''}${message}`
}
