/** Nothing is shown before this, s. */
export const QUIET_START = 2
/** Time between two showings, s: of a line that is rewritten, and of lines that stay. */
const REWRITTEN = 0.2
const STAYING = 5

/** Where progress goes: a terminal, or a file or pipe. */
export type Sink = Pick<NodeJS.WriteStream, 'write' | 'isTTY' | 'columns'>

/** One line rewritten on a terminal, a new one every few seconds elsewhere, none when `quiet`. */
export function startLine(sink: Sink, quiet: boolean): { isDue: () => boolean; show: (text: string) => void; clear: () => void } {
  const start = performance.now()
  const interval = sink.isTTY ? REWRITTEN : STAYING
  let shownAt = Number.NEGATIVE_INFINITY
  let onLine = false
  const isDue = () => {
    const now = (performance.now() - start) / 1000
    return !quiet && now >= QUIET_START && now - shownAt >= interval
  }
  return {
    isDue,
    show: (text) => {
      if (!isDue()) return
      shownAt = (performance.now() - start) / 1000
      if (sink.isTTY) {
        sink.write(`\r\x1b[K${text.slice(0, (sink.columns ?? 80) - 1)}`)
        onLine = true
      } else sink.write(`${text}\n`)
    },
    clear: () => {
      if (onLine) sink.write('\r\x1b[K')
      onLine = false
    }
  }
}
