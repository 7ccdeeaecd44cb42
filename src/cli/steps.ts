import { QUIET_START } from './status-line.js'

/** Shows one line for each step of a command that takes long; nothing in its first seconds, or when `quiet`. */
export function startSteps(sink: Pick<NodeJS.WriteStream, 'write'>, quiet: boolean): { show: (text: string) => void } {
  const start = performance.now()
  return {
    show: (text) => {
      if (!quiet && performance.now() - start > 1000 * QUIET_START) sink.write(`${text}\n`)
    }
  }
}
