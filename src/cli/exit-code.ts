/** Exit codes of every command. */
export const exitCode = {
  done: 0,
  /** A defect of the program. */
  defect: 1,
  /** The scene or the command line is wrong. */
  wrongInput: 2,
  /** Stopped before the end. */
  stopped: 3,
  /** Done, but the precision asked for was not reached. */
  imprecise: 4
} as const

export type ExitCode = (typeof exitCode)[keyof typeof exitCode]
